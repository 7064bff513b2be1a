import { describe, expect, test, vi } from 'vitest'
import { testClock } from '../../support/phone'
import { note, outbox } from '../../support/phone-world'
import { bigPhotoOf, bytesOf, isWhole, KB, photoRecord, withPhoto } from '../../support/photo-phone'

describe('a photo that meets trouble', () => {
  test('[fault 24] a portal’s answers mark nothing as sent and lose nothing', async () => {
    const { shop, phone, photo } = await withPhoto(100 * KB)
    const portals = [
      () => new Response('<html>Sign in</html>', { headers: { 'content-type': 'text/html' } }),
      () => new Response(null, { status: 204 }),
      () => new Response(null, { status: 201, headers: { 'upload-offset': '102400' } }),
      () => Response.json({ hash: photo.hash, kind: 'fine' }),
      () => new Response('gone', { status: 404 }),
      () => new Response('moved', { status: 410 }),
      () => Response.json({ kind: 'notFound' }, { status: 404 }),
      () => new Response('x', { status: 511 }),
    ]
    for (const instead of portals) {
      shop.fault = ({ path }) => (path === '/api/sync' ? null : { instead: instead() })
      await phone.sync()
      expect(await photoRecord(phone, photo.hash)).toMatchObject({ state: 'waiting' })
      expect(await phone.phone.core.db.photoBytes.count()).toBe(1)
    }
    shop.fault = () => null
    await phone.sync()
    expect(isWhole(shop, photo)).toBe(true)
  })

  test('[fault 24] bytes bent on the way are sent again', async () => {
    const { shop, phone, photo } = await withPhoto(100 * KB)
    let bent = 0
    shop.fault = ({ method, body }) => {
      if (method === 'PATCH' && bent < 2) {
        bent += 1
        const at = body[100] ?? 0
        body[100] = at ^ 1
      }
      return null
    }
    await phone.sync()
    expect(shop.photos.size).toBe(0)
    await phone.sync()
    await phone.sync()
    expect(isWhole(shop, photo)).toBe(true)
  })

  test('[P16] what the shop will never take is kept, with its reason', async () => {
    const { shop, phone, photo } = await withPhoto(50 * KB)
    shop.fault = ({ method }) =>
      method === 'PATCH'
        ? {
            instead: new Response(null, {
              status: 422,
              headers: { 'tus-resumable': '1.0.0', 'x-farbench-problem': 'hasPosition' },
            }),
          }
        : null
    await phone.sync()
    expect(await photoRecord(phone, photo.hash)).toMatchObject({
      state: 'stuck',
      reason: 'hasPosition',
    })
    const [item] = (await phone.see(phone.phone.unsent)).items
    expect(item).toMatchObject({
      what: 'Photo',
      state: 'stuck',
      reason: 'The file still says where it was made, so the shop refuses it.',
    })
    expect(await phone.phone.core.db.photoBytes.count()).toBe(1)
    await phone.phone.letGo({ hash: photo.hash })
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, filesLetGo: 1 })
    expect(await phone.phone.core.db.photoBytes.count()).toBe(0)
  })

  test('[PH4] [P23] the unsent view tells how much of it the shop has', async () => {
    const { shop, phone } = await withPhoto(300 * KB)
    let patches = 0
    shop.fault = ({ method }) => {
      if (method === 'PATCH') patches += 1
      return patches > 2 ? { noLine: true } : null
    }
    await phone.sync()
    const view = await phone.see(phone.phone.unsent)
    expect(view.items).toMatchObject([
      { kind: 'photoBytes', bytes: 300 * KB, bytesDone: 192 * KB, state: 'waiting' },
    ])
    expect(view.bytes).toBe(108 * KB)
  })

  test('[fault 27] [P12] after a restored backup it is offered again without its bytes', async () => {
    const { shop, phone, photo } = await withPhoto(100 * KB)
    await phone.sync()
    shop.restoreWithout([...shop.ops.keys()].slice(-1))
    await phone.sync()
    expect((await photoRecord(phone, photo.hash)).state).toBe('sent')
    shop.photos.delete(photo.hash)
    shop.restoreWithout([])
    await phone.sync()
    expect(await photoRecord(phone, photo.hash)).toMatchObject({
      state: 'stuck',
      reason: 'bytesGone',
    })
  })

  test('[P12] a phone whose clock is a year back offers it again as well', async () => {
    const yearBack = testClock(Date.UTC(2025, 10, 24, 18, 40))
    const { shop, phone, photo } = await withPhoto(20 * KB, { clock: yearBack })
    await phone.sync()
    expect((await photoRecord(phone, photo.hash)).state).toBe('sent')
    shop.photos.delete(photo.hash)
    shop.restoreWithout([])
    await phone.sync()
    expect(await photoRecord(phone, photo.hash)).toMatchObject({ reason: 'bytesGone' })
  })

  test('[P25] a photo kept by the version before, bytes beside its facts, is sent all the same', async () => {
    const { shop, phone, photo } = await withPhoto(100 * KB)
    const { db } = phone.phone.core
    const held = await db.photoBytes.get(photo.hash)
    const { uploaded: _u, sentAt: _s, thumb: _t, ...old } = await photoRecord(phone, photo.hash)
    await db.photo.put({ ...old, bytes: held?.bytes ?? null })
    await db.photoBytes.clear()
    await phone.sync()
    expect(isWhole(shop, photo)).toBe(true)
    expect(await photoRecord(phone, photo.hash)).toMatchObject({ state: 'sent', bytes: null })
  })
})

describe('a phone without room', () => {
  test('[fault 20] [P21] a photo without room is refused at once, and words still fit', async () => {
    const { phone, jobId } = await withPhoto(10 * KB)
    let usage = 900_000
    const estimate = () => Promise.resolve({ quota: 1_000_000, usage })
    vi.stubGlobal('navigator', {
      onLine: true,
      storage: { estimate, persisted: async () => true, persist: async () => true },
    })
    const photo = bigPhotoOf(jobId, bytesOf(60 * KB, 5))
    const entry = note(phone, jobId, 'With a photo too many')
    await expect(phone.record([entry], { photos: [photo] })).rejects.toMatchObject({
      kind: 'noRoomForPhoto',
    })
    expect(await phone.phone.core.db.photo.get(photo.hash)).toBeUndefined()
    await phone.record([note(phone, jobId, 'Words alone')])
    usage = 100_000
    await phone.record([entry], { photos: [photo] })
    await phone.sync()
    expect((await photoRecord(phone, photo.hash)).state).toBe('sent')
    vi.unstubAllGlobals()
  })

  test('[fault 20] small copies of what the shop has make room before anything is refused', async () => {
    const { phone, photo, jobId, shop } = await withPhoto(10 * KB)
    await phone.sync()
    expect((await photoRecord(phone, photo.hash)).thumb).not.toBeNull()
    const { db } = phone.phone.core
    const room = { left: 0 }
    db.photoBytes.hook('creating', () => {
      if (room.left === 0) throw new DOMException('no room', 'QuotaExceededError')
    })
    const next = bigPhotoOf(jobId, bytesOf(20 * KB, 9))
    const keep = phone.record([note(phone, jobId, 'Second')], { photos: [next] })
    await expect(keep).rejects.toMatchObject({ kind: 'noRoomForPhoto' })
    expect((await photoRecord(phone, photo.hash)).thumb).toBeNull()
    expect(await outbox(phone)).toHaveLength(3)
    room.left = 1
    await phone.record([note(phone, jobId, 'Second')], { photos: [next] })
    await phone.sync()
    expect(isWhole(shop, next)).toBe(true)
  })
})
