import { gzipSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { MAX_RAW_BYTES, readCapped, readJson } from '@/lib/sync/server/body'

const request = (body: BodyInit, headers: Record<string, string> = {}) =>
  new Request('http://shop.invalid/api/sync', { method: 'POST', body, headers })
const refused = (kind: string) => ({ ok: false, problem: { kind } })

describe('bodies', () => {
  it('[P14] stops reading at the cap, also when the length is not announced', async () => {
    let handed = 0
    const endless = new ReadableStream<Uint8Array>({
      pull(controller) {
        handed += 64 * 1024
        controller.enqueue(new Uint8Array(64 * 1024))
      },
    })
    const init = { method: 'POST', body: endless, duplex: 'half' }
    const answer = await readCapped(
      new Request('http://shop.invalid/', init as RequestInit),
      MAX_RAW_BYTES,
    )
    expect(answer).toEqual(refused('tooLarge'))
    expect(handed).toBeLessThan(MAX_RAW_BYTES + 4 * 64 * 1024)
  })

  it('[P14] refuses an announced length past the cap unread', async () => {
    const answer = await readCapped(request('x', { 'content-length': '999999999' }), MAX_RAW_BYTES)
    expect(answer).toEqual(refused('tooLarge'))
  })

  it('[P14] answers a zip bomb with 413 and keeps memory flat over many tries', async () => {
    const bomb = gzipSync(Buffer.alloc(64 * 1024 * 1024), { level: 9 })
    expect(bomb.length).toBeLessThan(MAX_RAW_BYTES)
    const before = process.memoryUsage().rss
    for (let i = 0; i < 12; i++) expect(await readJson(bomb, 'gzip')).toEqual(refused('tooLarge'))
    expect(process.memoryUsage().rss - before).toBeLessThan(100 * 1024 * 1024)
  })

  it('[P14] refuses a cut and a flipped gzip body', async () => {
    const whole = gzipSync(
      JSON.stringify({ ops: Array.from({ length: 300 }, (_, i) => `op ${i}`) }),
    )
    expect((await readJson(whole, 'gzip')).ok).toBe(true)
    for (const cut of [1, 10, whole.length >> 1, whole.length - 1]) {
      expect(await readJson(whole.subarray(0, cut), 'gzip')).toEqual(refused('badGzip'))
    }
    // Every byte from the data on is covered by the CRC-32 and length of RFC 1952.
    for (let at = 10; at < whole.length; at += 7) {
      const flipped = Buffer.from(whole)
      flipped[at] = (flipped[at] ?? 0) ^ 0x10
      expect((await readJson(flipped, 'gzip')).ok).toBe(false)
    }
  })

  it('[P14] takes only gzip and plain bodies of JSON', async () => {
    expect(await readJson(Buffer.from('{"a":1}'), null)).toEqual({ ok: true, value: { a: 1 } })
    expect(await readJson(Buffer.from('{"a":1}'), 'br')).toEqual(refused('badRequest'))
    expect(await readJson(Buffer.from('<html>'), null)).toEqual(refused('badJson'))
  })
})
