import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getFile } from '@/app/api/desk/phones/files/[hash]/route'
import { GET as getPhoto, PUT as putPhoto } from '@/app/api/photos/[hash]/route'
import { asShop } from '@/db/client'
import { findPhoto } from '@/db/queries/photos'
import { logAdd } from '../support/field-ops'
import { deskOf, type OwnersDesk } from '../support/quarantine-world'
import type { RawDevice } from '../support/raw-device'
import { phoneOf, problemOf, signIn, sync } from '../support/sync-world'
import { at, hashOf, photoBody, said, UploadWorld, voiceBody } from '../support/upload-world'
import { webmOf } from '../support/voices'

let upload: UploadWorld
let desk: OwnersDesk
let owner: string
beforeAll(async () => {
  upload = await UploadWorld.open()
  owner = (await signIn(upload.world.a, 'owner')).cookie
  desk = deskOf(owner)
})
afterAll(() => upload.world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(upload.world.a.id, run)
const row = (bytes: Buffer) => inA((tx) => findPhoto(tx, hashOf(bytes)))
const mechanicsPhone = async () => (await phoneOf(upload.world.a, 'mechanic')).device

/** Names a file by an op of that phone. */
async function name(bytes: Buffer, from: RawDevice): Promise<string> {
  const op = from.op(logAdd(from, upload.job, photoBody(bytes)))
  await sync(from, [op])
  return op.id
}

const show = (route: typeof getFile, bytes: Buffer, cookie: string) =>
  route(new Request('http://shop.invalid/', { headers: { cookie } }), at(hashOf(bytes)))

describe('[Q3] files of a phone that was taken out', () => {
  it('[Q3] go into quarantine chunk by chunk, and are let in with their op', async () => {
    const device = await mechanicsPhone()
    await desk.revoke(device.id)
    const bytes = upload.another()
    expect(said(await upload.begin(bytes, device))).toMatchObject({ status: 409 })
    const opId = await name(bytes, device)
    expect(said(await upload.begin(bytes, device))).toMatchObject({ status: 201, offset: 0 })
    await upload.add(bytes, { offset: 0, length: 10_000 }, device)
    expect(said(await upload.ask(bytes, device))).toMatchObject({ offset: 10_000, stored: null })
    const last = await upload.sendAll(bytes, 32_768, device)
    expect(said(last).stored).toBe(hashOf(bytes))
    expect(said(await upload.begin(bytes, device)).stored).toBe(hashOf(bytes))
    expect(await row(bytes)).toBeUndefined()
    expect((await show(getPhoto, bytes, owner)).status).toBe(404)
    expect(upload.stored()).not.toContain(hashOf(bytes))
    expect((await desk.phone(device.id)).items).toMatchObject([
      { opId, file: { hash: hashOf(bytes), here: true } },
    ])
    const word = await desk.decided(device.id, { decision: 'accept', opId })
    expect(word).toEqual([{ opId, is: 'accepted', file: 'in' }])
    expect(await row(bytes)).toMatchObject({ jobId: upload.job, bytes: bytes.length })
    expect((await show(getPhoto, bytes, owner)).status).toBe(200)
  })

  it('[Q3] come in by themselves when the owner has accepted the op before', async () => {
    const device = await mechanicsPhone()
    await desk.revoke(device.id)
    const bytes = upload.another()
    const opId = await name(bytes, device)
    const word = await desk.decided(device.id, { decision: 'accept', opId })
    expect(word).toMatchObject([{ is: 'accepted', file: 'notHere' }])
    await upload.sendAll(bytes, 32_768, device)
    expect(await row(bytes)).toMatchObject({ jobId: upload.job })
  })

  it('[Q3] stay out when their op is refused', async () => {
    const device = await mechanicsPhone()
    await desk.revoke(device.id)
    const bytes = upload.another()
    const opId = await name(bytes, device)
    await upload.sendAll(bytes, 32_768, device)
    await desk.decided(device.id, { decision: 'refuse', opId, reason: 'Not ours' })
    expect(await row(bytes)).toBeUndefined()
    const again = await desk.decide(device.id, {
      decision: 'accept',
      opId: `file:${hashOf(bytes)}`,
    })
    expect(await problemOf(again)).toMatchObject({ status: 409, kind: 'decidedBefore' })
  })

  it('[Q3] of an entry that was in before are decided on by themselves', async () => {
    const device = await mechanicsPhone()
    const bytes = upload.another()
    await name(bytes, device)
    await desk.revoke(device.id)
    await upload.sendAll(bytes, 32_768, device)
    const { items } = await desk.phone(device.id)
    expect(items).toMatchObject([{ kind: 'file', file: { here: true }, jobId: null }])
    expect(await row(bytes)).toBeUndefined()
    const word = await desk.decided(device.id, { decision: 'accept', opId: null })
    expect(word).toMatchObject([{ is: 'accepted', file: 'in' }])
    expect(await row(bytes)).toMatchObject({ jobId: upload.job })
  })

  it('[Q3] in one piece, of protocol 1, go the same way; twisted ones are refused', async () => {
    const device = await mechanicsPhone()
    await desk.revoke(device.id)
    const bytes = upload.another()
    const opId = await name(bytes, device)
    const hash = hashOf(bytes)
    const twisted = device.photo(bytes, hash)
    const broken = new Request(twisted, { body: Buffer.concat([bytes, Buffer.from('x')]) })
    expect(await problemOf(await putPhoto(broken, at(hash)))).toMatchObject({ kind: 'wrongHash' })
    expect((await putPhoto(device.photo(bytes, hash), at(hash))).status).toBe(200)
    expect(await row(bytes)).toBeUndefined()
    const stray = upload.another()
    const unnamed = await putPhoto(device.photo(stray, hashOf(stray)), at(hashOf(stray)))
    expect(await problemOf(unnamed)).toMatchObject({ status: 409, kind: 'entryFirst' })
    await desk.decided(device.id, { decision: 'accept', opId })
    expect(await row(bytes)).toBeDefined()
  })

  it('[Q3] that are not what the entry says are kept, and not let in', async () => {
    const device = await mechanicsPhone()
    await desk.revoke(device.id)
    const bytes = Buffer.from('no picture at all, whatever the entry says of it')
    const opId = await name(bytes, device)
    await upload.sendAll(bytes, 32_768, device)
    const word = await desk.decided(device.id, { decision: 'accept', opId })
    expect(word).toMatchObject([{ is: 'accepted', file: 'refused' }])
    expect(await row(bytes)).toBeUndefined()
    expect((await show(getFile, bytes, owner)).status).toBe(422)
  })

  it('[Q3] of an op that the shop had refused are kept as well', async () => {
    const device = (await phoneOf(upload.world.a, 'guide')).device
    const bytes = upload.another()
    const body = photoBody(bytes)
    const op = device.op(logAdd(device, upload.job, body, { authorId: upload.world.a.id }))
    expect((await sync(device, [op])).results).toMatchObject([{ code: 'not_yours' }])
    await desk.revoke(device.id)
    expect(said(await upload.sendAll(bytes, 32_768, device)).stored).toBe(hashOf(bytes))
    const word = await desk.decided(device.id, { decision: 'accept', opId: null })
    expect(word).toMatchObject([{ is: 'left', code: 'entryFirst' }])
  })

  it('[Q3] are shown to the owner alone: a picture as a copy made anew, a voice note as it is', async () => {
    const device = await mechanicsPhone()
    await desk.revoke(device.id)
    const bytes = upload.another()
    await name(bytes, device)
    await upload.sendAll(bytes, 32_768, device)
    const shown = await show(getFile, bytes, owner)
    expect(shown.headers.get('content-type')).toBe('image/jpeg')
    const copy = Buffer.from(await shown.arrayBuffer())
    expect(copy.includes(Buffer.from('upload '))).toBe(false)
    const voice = webmOf({ seconds: 22 })
    const op = device.op(logAdd(device, upload.job, voiceBody(voice)))
    await sync(device, [op])
    await upload.sendAll(voice, 32_768, device)
    const heard = await show(getFile, voice, owner)
    expect(heard.headers.get('content-type')).toBe('audio/webm')
    const { cookie } = await signIn(upload.world.a, 'dispatcher')
    expect((await show(getFile, bytes, cookie)).status).toBe(403)
    const foreign = (await signIn(upload.world.b, 'owner')).cookie
    expect((await show(getFile, bytes, foreign)).status).toBe(404)
  })
})
