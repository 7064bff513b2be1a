import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/desk/import/route'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { revokeDevice } from '@/db/queries/devices'
import { listLog } from '@/db/queries/log-entries'
import { type ImportAnswer, importAnswer } from '@/lib/sync/protocol/unsent-file'
import { jobOpen, machineAdd } from '../support/field-ops'
import { createPhone } from '../support/phone'
import { note, photoOf } from '../support/phone-world'
import { RealShop } from '../support/real-shop'
import type { TestShop } from '../support/shop-fixture'
import { openSyncWorld, problemOf, type SyncWorld, signIn } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

/** A phone that holds a job, a note and a photo which it cannot send, and the file it makes of them. */
async function stranded(shop: TestShop, who = 'mechanic') {
  const { cookie } = await signIn(shop, who)
  const person = shop.people[who]
  if (!person) throw new Error(who)
  const line = new RealShop(cookie)
  const actor = { shopId: shop.id, personId: person.id, roles: person.roles, name: person.name }
  const phone = await createPhone({ fetch: line.fetch, ports: { actor } })
  await phone.phone.enrol()
  line.fault = 'noLine'
  const machine = machineAdd()
  const job = jobOpen(machine.fields.id)
  const jobId = job.fields.id
  const photo = photoOf(jobId)
  const { hash } = photo
  const picture = {
    hash,
    bytes: photo.bytes.byteLength,
    mime: 'image/jpeg',
    width: 1,
    height: 1,
  } as const
  await phone.record([machine, job, note(phone, jobId, 'Plug was wet')])
  await phone.record(
    [
      phone.phone.entry(
        jobId,
        { kind: 'photo', photo: picture, caption: null },
        { bookVersion: 1 },
      ),
    ],
    { photos: [photo] },
  )
  const fileOf = async () => {
    const [file] = await phone.phone.exportFiles()
    return (await file?.text()) ?? ''
  }
  return { phone, line, jobId, hash, fileOf }
}

async function bring(shop: TestShop, text: string, as = 'dispatcher', act = '?do=take') {
  const { cookie } = await signIn(shop, as)
  return await POST(
    new Request(`http://shop.invalid/api/desk/import${act}`, {
      method: 'POST',
      body: text,
      headers: { cookie },
    }),
  )
}
const listOf = async (answer: Response): Promise<ImportAnswer> => {
  if (answer.status !== 200) throw new Error(await answer.text())
  return importAnswer.parse(await answer.json())
}
const outcomes = (answer: ImportAnswer) => answer.ops.map((op) => op.outcome)

describe('a file of unsent work at the desk', () => {
  it('[IM1] shows what is in it without taking anything', async () => {
    const { fileOf, jobId } = await stranded(world.a)
    const answer = await listOf(await bring(world.a, await fileOf(), 'dispatcher', ''))
    expect(answer).toMatchObject({ applied: false, person: { id: world.a.people.mechanic?.id } })
    expect(answer.ops.map((op) => [op.kind, op.entry, op.outcome])).toEqual([
      ['machine.add', null, 'new'],
      ['job.open', null, 'new'],
      ['log.add', 'note', 'new'],
      ['log.add', 'photo', 'new'],
    ])
    expect(answer.photos).toMatchObject([{ outcome: 'new', jobId }])
    expect(await asShop(world.a.id, (tx) => listLog(tx, jobId))).toEqual([])
  })

  it('[IM2] takes it as the phone would have sent it; brought twice or sent later it is a duplicate', async () => {
    const { phone, line, fileOf, jobId } = await stranded(world.a)
    const text = await fileOf()
    const first = await listOf(await bring(world.a, text, 'owner'))
    expect(outcomes(first)).toEqual(['taken', 'taken', 'taken', 'taken'])
    expect(first.photos).toMatchObject([{ outcome: 'taken' }])
    const second = await listOf(await bring(world.a, text))
    expect(outcomes(second)).toEqual(['already', 'already', 'already', 'already'])
    expect(second.photos).toMatchObject([{ outcome: 'already' }])
    line.fault = 'none'
    await phone.sync()
    expect((await phone.see(phone.phone.unsent)).count).toBe(0)
    const log = await asShop(world.a.id, (tx) => listLog(tx, jobId))
    expect(log.map((row) => [row.order, row.body.kind, row.authorId])).toEqual([
      [1, 'note', world.a.people.mechanic?.id],
      [2, 'photo', world.a.people.mechanic?.id],
    ])
  })

  it('[IM2] takes the rest of what came in half, and lists what is refused with its reason', async () => {
    const { phone, line, fileOf, jobId } = await stranded(world.a)
    await phone.record([
      { kind: 'job.move', jobId, fields: { from: 'assigned', to: 'underWay', reason: null } },
    ])
    const text = await fileOf()
    line.fault = 'loseReply'
    await phone.sync()
    const answer = await listOf(await bring(world.a, text))
    expect(outcomes(answer)).toEqual(['already', 'already', 'already', 'already', 'refused'])
    expect(answer.ops[4]).toMatchObject({ kind: 'job.move', code: 'stale_status', detail: 'open' })
  })

  it('[IM1] refuses a file in which one letter was changed, with one clear sentence', async () => {
    const { fileOf, jobId } = await stranded(world.a)
    const text = await fileOf()
    const forged = text.replace('Plug was wet', 'Plug was dry')
    expect(forged).not.toBe(text)
    const edited = [
      forged,
      text.replace(/"at": "2/, '"at": "3'),
      text.replace(/"signature": "[^"]*"/, '"signature": "nothing"'),
    ]
    for (const file of edited) {
      expect(await problemOf(await bring(world.a, file))).toMatchObject({
        status: 422,
        kind: 'changedFile',
        title: 'The file was changed after the phone made it. Nothing was taken.',
      })
    }
    expect(await asShop(world.a.id, (tx) => listLog(tx, jobId))).toEqual([])
  })

  it('[IM1] refuses what is no such file, of another shop, of an unknown or revoked phone', async () => {
    const { fileOf, phone } = await stranded(world.a)
    const text = await fileOf()
    const kindOf = async (shop: TestShop, file: string) =>
      (await problemOf(await bring(shop, file))).kind
    expect(await kindOf(world.a, '')).toBe('notOurFile')
    expect(await kindOf(world.a, '{"format":"x"}')).toBe('notOurFile')
    expect(await kindOf(world.a, '{"format":"farbench-unsent-1","ops":[]}')).toBe('olderFile')
    expect(await kindOf(world.b, text)).toBe('otherShop')
    expect(await kindOf(world.a, text.replace(phone.phone.deviceId, v7()))).toBe('unknownPhone')
    const other = world.a.people.second?.id ?? ''
    expect(await kindOf(world.a, text.replace(phone.phone.actor.personId, other))).toBe(
      'unknownPhone',
    )
    const now = new Date().toISOString()
    const by = world.a.people.owner?.id ?? ''
    await asShop(world.a.id, (tx) => revokeDevice(tx, { id: phone.phone.deviceId, by, now }))
    expect(await kindOf(world.a, text)).toBe('revokedPhone')
  })

  it('[IM1] is for the dispatcher and the owner, and has a largest size', async () => {
    const { fileOf } = await stranded(world.a)
    const text = await fileOf()
    for (const who of ['mechanic', 'guide', 'parts', 'both']) {
      expect((await bring(world.a, text, who)).status).toBe(403)
    }
    const huge = await bring(world.a, 'x'.repeat(33 * 1024 * 1024))
    expect(huge.status).toBe(413)
  })

  it('[IM2] leaves what its person has let go, and says so', async () => {
    const { phone, fileOf } = await stranded(world.a)
    const { db } = phone.phone.core
    const last = (await db.outbox.orderBy('dseq').last()) ?? null
    if (last === null) throw new Error('nothing is unsent')
    await db.letGo.put({ ...last, state: 'letGo', letGoAt: 1 })
    await db.outbox.delete(last.dseq)
    const answer = await listOf(await bring(world.a, await fileOf()))
    expect(answer.ops.at(-1)).toMatchObject({ heldAs: 'letGo', outcome: 'refused', code: 'letGo' })
    expect(outcomes(answer).slice(0, 3)).toEqual(['taken', 'taken', 'taken'])
  })

  it('[IM3] stands in the audit trail with who brought it and what became of it', async () => {
    const { fileOf, phone } = await stranded(world.b)
    await bring(world.b, await fileOf(), 'owner')
    const trail = await asShop(world.b.id, (tx) => listAudit(tx, null))
    expect(trail.findLast((entry) => entry.action === 'unsent.imported')).toMatchObject({
      actorId: world.b.people.owner?.id,
      entity: 'device',
      entityId: phone.phone.deviceId,
      detail: { records: 4, taken: 4, refused: 0, photos: 1, photosTaken: 1 },
    })
  })
})
