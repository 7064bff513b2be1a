import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { gzipSync } from 'node:zlib'
import { v7 } from 'uuid'
import { afterEach, describe, expect, test } from 'vitest'
import { systemTimer } from '@/lib/ports/clock'
import { networkOf } from '@/lib/ports/network'
import { BatchSize } from '@/lib/sync/client/batch-size'
import { backoffMs } from '@/lib/sync/client/phone-sender'
import { AlarmClock } from '../../support/alarm-clock'
import { createPhone, type TestPhone, testClock } from '../../support/phone'
import { atWork, note, outbox, photoOf, states } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

/** Even figures in [0, 1) from a seed (mulberry32, public domain). */
function shares(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6d2b79f5) | 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32
  }
}

/** 50 kbit/s with 600 ms there and back, on which every fifth exchange is cut somewhere on its way. */
function roughLine(shop: ShopDouble, clock: ReturnType<typeof testClock>, seed: number) {
  const share = shares(seed)
  const bytes = { useful: 0, wasted: 0 }
  const travel = (moved: number) => clock.pass(600 + (moved * 8) / 50)
  const fetch = async (path: string, init: RequestInit) => {
    const up = init.body instanceof Uint8Array ? init.body.byteLength : 0
    const cutAt = share() < 0.2 ? share() : null
    // Not one that never got as far as the shop: its bytes are wasted as far as they went.
    if (cutAt !== null && cutAt < 0.5) {
      const moved = up * cutAt * 2
      bytes.wasted += moved
      travel(moved)
      throw new TypeError('Failed to fetch')
    }
    const answer = await shop.fetch(path, init)
    const text = await answer.clone().text()
    const down = gzipSync(text).byteLength
    if (cutAt !== null) {
      // The shop has it and says so, but the word is cut.
      const moved = up + down * (cutAt - 0.5) * 2
      bytes.wasted += moved
      travel(moved)
      throw new TypeError('Failed to fetch')
    }
    bytes.useful += up + down
    travel(up + down)
    return answer
  }
  return { fetch, bytes }
}

describe('[P15] a rough line', () => {
  test('20 % cut at 50 kbit/s: everything arrives, and under 30 % of the bytes are wasted', async () => {
    const total = { useful: 0, wasted: 0 }
    for (const seed of [1, 2, 3, 4]) {
      const shop = new ShopDouble()
      const clock = testClock()
      const line = roughLine(shop, clock, seed)
      const { phone: first, machine, job, jobId } = await atWork(shop, { clock })
      first.kill()
      const phone = await createPhone({
        fetch: line.fetch,
        ports: { clock, indexed: first.indexed },
      })
      shop.fault = () => ({ noLine: true })
      const notes = Array.from({ length: 300 }, (_, index) =>
        note(phone, jobId, `Reading ${index} of the long run, ${(index * 7919) % 1000} mV`),
      )
      await phone.record([machine, job, ...notes])
      shop.fault = () => null
      line.bytes.useful = 0
      line.bytes.wasted = 0
      let tries = 0
      while ((await states(phone)).some((state) => state !== 'done')) {
        tries += 1
        expect(tries, `seed ${seed}`).toBeLessThan(40)
        await phone.sync()
      }
      expect(shop.ops.size).toBe(302)
      total.useful += line.bytes.useful
      total.wasted += line.bytes.wasted
      phone.kill()
    }
    expect(total.wasted).toBeGreaterThan(0)
    expect(total.wasted / (total.useful + total.wasted)).toBeLessThan(0.3)
  })

  test('halves what was sent when it is cut, not under 25, and doubles when it arrives', () => {
    const size = new BatchSize()
    expect(size.limit).toBe(500)
    size.cut(500, 1_999)
    expect(size.limit).toBe(500)
    const after: number[] = []
    for (let tries = 0; tries < 6; tries += 1) {
      size.cut(Math.min(120, size.limit), 9_000)
      after.push(size.limit)
    }
    expect(after).toEqual([60, 30, 25, 25, 25, 25])
    for (let tries = 0; tries < 5; tries += 1) size.arrived()
    expect(size.limit).toBe(500)
  })

  test('waits longer for more bytes: a full request at 50 kbit/s is not cut by the phone itself', async () => {
    const waits: number[] = []
    const network = networkOf({
      fetch: () => Promise.reject(new TypeError('Failed to fetch')),
      online: () => true,
      timer: {
        after: (ms) => {
          waits.push(ms)
          return () => undefined
        },
      },
    })
    for (const bytes of [0, 64 * 1024]) {
      await network.send({ method: 'POST', path: '/api/sync', body: new Uint8Array(bytes) })
    }
    const [empty = 0, full = 0] = waits
    // 64 KB take 10.5 s at 50 kbit/s, there and back not counted.
    expect(full - empty).toBeGreaterThan((64 * 1024 * 8) / 50)
    expect(empty).toBeGreaterThan(30_000)
  })
})

describe('[P16] many phones at once', () => {
  test('[fault 26] 50 phones whose shop comes back do not come back as one: no second peak above half', async () => {
    const time = new AlarmClock()
    const shop = new ShopDouble()
    const phones: TestPhone[] = []
    const share = shares(7)
    const arrivals: number[] = []
    const done = new Map<number, number>()
    /** The shop takes 10 exchanges a second and asks the others to come later. */
    const taken = new Map<number, number>()
    const startMs = time.now()
    const fetch = (index: number) => async (path: string, init: RequestInit) => {
      if (path !== '/api/sync') return shop.fetch(path, init)
      arrivals.push(time.now() - startMs)
      const second = Math.floor((time.now() - startMs) / 1000)
      const sofar = taken.get(second) ?? 0
      if (sofar >= 10) return new Response('busy', { status: 503 })
      taken.set(second, sofar + 1)
      const answer = await shop.fetch(path, init)
      done.set(index, done.get(index) ?? time.now() - startMs)
      return answer
    }
    for (let index = 0; index < 50; index += 1) {
      const phone = await createPhone({
        fetch: fetch(index),
        ports: { clock: { now: time.now }, timer: time.timer(), ids: { next: () => v7(), share } },
      })
      await phone.phone.enrol()
      phones.push(phone)
    }
    // Signal is back for all of them in the same instant.
    for (const { phone } of phones) phone.sender.poke('online')
    const idle = async () => {
      await Promise.all(phones.map(({ phone }) => phone.sender.idle()))
    }
    await time.pass(59_000, idle)
    for (const phone of phones) phone.kill()
    expect(done.size).toBe(50)
    const perSecond = Array.from(
      { length: 40 },
      (_, second) => arrivals.filter((at) => Math.floor(at / 1000) === second).length,
    )
    expect(perSecond[0]).toBeGreaterThanOrEqual(50)
    expect(Math.max(...perSecond.slice(1))).toBeLessThanOrEqual(25)
    // None starves.
    expect(Math.max(...done.values())).toBeLessThan(40_000)
  })

  test('a shop that is busy is given from 8 s on, a dead line from 1 s on', () => {
    expect(backoffMs(1, 0.5)).toBe(1_000)
    expect(backoffMs(1, 0.5, true)).toBe(8_000)
    expect(backoffMs(20, 0.999_999, true)).toBeLessThan(300_000)
  })
})

const servers: ReturnType<typeof createServer>[] = []
afterEach(() => {
  for (const server of servers.splice(0)) server.close()
})

describe('[P17] strangers on the line', () => {
  /** A real server that answers everything one odd way, and a phone whose requests reach it. */
  async function stranger(
    answer: (path: string) => {
      status: number
      headers: Record<string, string>
      body: Buffer | string
      cut?: boolean
    },
  ) {
    const server = createServer((request, response) => {
      const { status, headers, body, cut } = answer(request.url ?? '')
      response.writeHead(status, headers)
      response.write(body)
      if (cut === true) response.destroy()
      else response.end()
    })
    servers.push(server)
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    const { port } = server.address() as AddressInfo
    return networkOf({
      fetch: (input, init) => fetch(`http://127.0.0.1:${port}${String(input)}`, init),
      online: () => true,
      timer: systemTimer,
    })
  }

  const json = { 'content-type': 'application/json' }
  const whole = JSON.stringify({
    protocol: 2,
    serverTime: '2026-11-24T18:40:00.000Z',
    taken: [],
    results: [],
    pull: { kind: 'notAsked' },
  })
  const packed = gzipSync(whole)
  const flipped = Buffer.from(packed)
  flipped[packed.length >> 1] = (flipped[packed.length >> 1] ?? 0) ^ 0x10
  const odd: [string, (path: string) => ReturnType<Parameters<typeof stranger>[0]>][] = [
    [
      'an HTML page',
      () => ({
        status: 200,
        headers: { 'content-type': 'text/html' },
        body: '<html>Log in</html>',
      }),
    ],
    [
      'HTML under the name of JSON',
      () => ({ status: 200, headers: json, body: '<html>Log in</html>' }),
    ],
    [
      'a redirect to such a page',
      (path) =>
        path === '/login-page'
          ? { status: 200, headers: json, body: whole }
          : { status: 302, headers: { location: '/login-page' }, body: '' },
    ],
    ['nothing at all', () => ({ status: 204, headers: {}, body: '' })],
    ['JSON of somebody else', () => ({ status: 200, headers: json, body: '{"taken":true}' })],
    [
      'half of the packed answer',
      () => ({
        status: 200,
        headers: { ...json, 'content-encoding': 'gzip' },
        body: packed.subarray(0, packed.length >> 1),
      }),
    ],
    [
      'a packed answer with one bit turned',
      () => ({ status: 200, headers: { ...json, 'content-encoding': 'gzip' }, body: flipped }),
    ],
    [
      'an answer cut in the middle',
      () => ({
        status: 200,
        headers: { ...json, 'content-length': '4000' },
        body: whole.slice(0, 60),
        cut: true,
      }),
    ],
    ['the portal’s own 511', () => ({ status: 511, headers: json, body: '{}' })],
  ]
  test.each(odd)(
    '[fault 24] %s counts as no line: nothing is marked as sent',
    async (_name, answer) => {
      const network = await stranger(answer)
      const { shop, phone, machine, job, jobId } = await atWork()
      shop.fault = () => ({ noLine: true })
      await phone.record([machine, job, note(phone, jobId, 'Kept')], { photos: [photoOf(jobId)] })
      phone.kill()
      const again = await createPhone({
        fetch: shop.fetch,
        ports: { indexed: phone.indexed, network },
      })
      await again.sync()
      expect(await states(again)).toEqual(['waiting', 'waiting', 'waiting'])
      const view = await again.see(again.phone.unsent)
      expect(view).toMatchObject({ online: false, stuckCount: 0, count: 4 })
      expect((await outbox(again)).every((record) => record.takenAt === null)).toBe(true)
      again.kill()
    },
  )
})
