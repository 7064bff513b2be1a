import { describe, expect, test } from 'vitest'
import { createPhone, testClock } from '../../support/phone'
import { note } from '../../support/phone-world'
import { isWhole, KB, photoRecord, withPhoto } from '../../support/photo-phone'

describe('a photo on its way', () => {
  test('[PH3] [fault 25] cut at every chunk, before and after the shop took it, goes on where it stood', async () => {
    const clock = testClock()
    for (const kind of ['noLine', 'loseReply'] as const) {
      const { shop, phone, photo } = await withPhoto(400 * KB, { clock })
      let cut = false
      shop.fault = ({ method }) => {
        // Slow enough that chunks stay small.
        clock.pass(10_000)
        if (method !== 'PATCH') return null
        cut = !cut
        if (!cut) return null
        return kind === 'noLine' ? { noLine: true } : { loseReply: true }
      }
      for (let runs = 0; runs < 40 && !shop.photos.has(photo.hash); runs++) await phone.sync()
      shop.fault = () => null
      await phone.sync()
      expect(isWhole(shop, photo)).toBe(true)
      expect((await photoRecord(phone, photo.hash)).state).toBe('sent')
      const { chunks } = shop.uploads
      // Every byte went once: each chunk begins where the one before ended.
      expect(chunks.reduce((sum, [, length]) => sum + length, 0)).toBe(400 * KB)
      expect(Math.max(...chunks.map(([, length]) => length))).toBeLessThanOrEqual(64 * KB)
    }
  })

  test('[fault 25] killed at every step and started again, sends it once', async () => {
    for (let at = 1; at < 14; at++) {
      const { shop, phone, photo, jobId } = await withPhoto(200 * KB)
      let steps = 0
      const dying = await createPhone({
        fetch: shop.fetch,
        ports: {
          indexed: phone.indexed,
          step: (name) => {
            if (!name.endsWith('Photo')) return
            steps += 1
            if (steps >= at) throw new Error('killed')
          },
        },
      })
      phone.kill()
      await dying.sync().catch(() => undefined)
      dying.kill()
      const again = await createPhone({ fetch: shop.fetch, ports: { indexed: phone.indexed } })
      await again.sync()
      expect(isWhole(shop, photo)).toBe(true)
      expect(await photoRecord(again, photo.hash)).toMatchObject({ state: 'sent', jobId })
      expect(await again.phone.core.db.photoBytes.count()).toBe(0)
      const sent = shop.uploads.chunks.reduce((sum, [, length]) => sum + length, 0)
      expect(sent).toBe(200 * KB)
      again.kill()
    }
  })

  test('[PH3] staged bytes that ran out or were lost at the shop are sent anew', async () => {
    const { shop, phone, photo } = await withPhoto(300 * KB)
    let patches = 0
    shop.fault = ({ method }) => {
      if (method !== 'PATCH') return null
      patches += 1
      if (patches === 2) shop.uploads.forgetStaged()
      if (patches === 4) shop.uploads.shorten(photo.hash, 1000)
      return null
    }
    await phone.sync()
    await phone.sync()
    expect(isWhole(shop, photo)).toBe(true)
    expect((await photoRecord(phone, photo.hash)).state).toBe('sent')
  })

  test('[PH3] a record made between two chunks goes before the next one', async () => {
    const { shop, phone, photo, jobId } = await withPhoto(600 * KB)
    const order: string[] = []
    let said: Promise<void> | null = null
    shop.fault = ({ path, method }) => {
      order.push(path === '/api/sync' ? 'records' : method)
      if (method === 'PATCH' && said === null) {
        said = phone.phone.record([note(phone, jobId, 'In between')])
      }
      return null
    }
    // The answer to the first chunk comes after the note was kept.
    const { network } = phone.ports
    const send = network.send.bind(network)
    network.send = async (request) => {
      const answer = await send(request)
      await said
      return answer
    }
    await phone.sync()
    await phone.phone.sender.idle()
    expect(order.slice(0, 5)).toEqual(['records', 'POST', 'PATCH', 'records', 'PATCH'])
    expect(isWhole(shop, photo)).toBe(true)
    expect(shop.rowsOf('logEntry')).toHaveLength(2)
  })

  test('[P3] long photos do not keep the shop’s news waiting', async () => {
    const clock = testClock()
    const { shop, phone } = await withPhoto(700 * KB, { clock })
    let patches = 0
    let exchanges = 0
    shop.fault = ({ path, method }) => {
      if (path === '/api/sync') exchanges += 1
      if (method === 'PATCH') {
        patches += 1
        clock.pass(15_000)
      }
      return null
    }
    await phone.sync()
    expect(patches).toBeGreaterThan(8)
    expect(exchanges).toBeGreaterThanOrEqual(Math.floor((patches * 15) / 75))
  })

  test('[PH2] a photo taken twice is one at the shop, and the second sends no byte', async () => {
    const { shop, phone, photo, jobId } = await withPhoto(100 * KB)
    await phone.sync()
    const before = shop.uploads.chunks.length
    await phone.record([note(phone, jobId, 'Again')], { photos: [photo] })
    await phone.sync()
    expect(shop.uploads.chunks).toHaveLength(before)
    expect(shop.photos.size).toBe(1)
    expect((await photoRecord(phone, photo.hash)).state).toBe('sent')
  })

  test('[P18] goes on after its device had to be enrolled anew', async () => {
    const { shop, phone, photo } = await withPhoto(300 * KB)
    let patches = 0
    shop.fault = ({ method }) => {
      if (method === 'PATCH') patches += 1
      if (patches === 2) {
        patches += 1
        shop.forgetDevices()
      }
      return null
    }
    await phone.sync()
    expect(isWhole(shop, photo)).toBe(true)
    expect(shop.uploads.chunks.reduce((sum, [, length]) => sum + length, 0)).toBe(300 * KB)
  })
})
