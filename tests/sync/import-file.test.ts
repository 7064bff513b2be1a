import { createHash } from 'node:crypto'
import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/desk/import/route'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { takeChanges } from '@/db/queries/changes'
import { listLog } from '@/db/queries/log-entries'
import { revokeMembership } from '@/db/queries/people'
import { findPhoto } from '@/db/queries/photos'
import { type ImportAnswer, importAnswer } from '@/lib/sync/protocol/unsent-file'
import { jobOpen, machineAdd } from '../support/field-ops'
import { createPhone } from '../support/phone'
import { note } from '../support/phone-world'
import { jpegOf } from '../support/pictures'
import { deskOf } from '../support/quarantine-world'
import { RealShop } from '../support/real-shop'
import type { TestShop } from '../support/shop-fixture'
import { openSyncWorld, problemOf, type SyncWorld, signIn } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

let shade = 0
/** A photo unlike any other: what stands behind its end changes the hash alone. */
function anotherPhoto(jobId: string) {
  shade += 1
  const bytes = Buffer.concat([jpegOf(), Buffer.from(`shade ${shade}`)])
  const hash = createHash('sha256').update(bytes).digest('hex')
  return { hash, jobId, bytes: new Uint8Array(bytes).buffer, mime: 'image/jpeg' as const }
}

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
  const photo = anotherPhoto(jobId)
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

  it('[IM1] refuses what is no such file, of another shop, of an unknown phone', async () => {
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

describe('a file of a phone that may not write any more', () => {
  /** The file of a phone that the owner has taken out since, with what its person let go as well. */
  async function ofRevoked() {
    const made = await stranded(world.a)
    const { db } = made.phone.phone.core
    const last = await db.outbox.orderBy('dseq').last()
    const letGo = note(made.phone, made.jobId, 'let go')
    await made.phone.record([letGo])
    const given = await db.outbox.orderBy('dseq').last()
    if (last === undefined || given === undefined) throw new Error('nothing is unsent')
    await db.letGo.put({ ...given, state: 'letGo', letGoAt: 1 })
    await db.outbox.delete(given.dseq)
    const desk = deskOf((await signIn(world.a, 'owner')).cookie)
    const { deviceId } = made.phone.phone
    expect((await desk.revoke(deviceId)).status).toBe(200)
    return { ...made, desk, deviceId, text: await made.fileOf() }
  }

  it('[IM4] [Q2] [Q3] goes into the quarantine of that phone, files too, and touches no job', async () => {
    const { text, desk, deviceId, jobId, hash } = await ofRevoked()
    const looked = await listOf(await bring(world.a, text, 'dispatcher', ''))
    expect(looked).toMatchObject({ quarantine: 'deviceRevoked', applied: false })
    expect(outcomes(looked)).toEqual(['new', 'new', 'new', 'new', 'new'])
    expect((await desk.phone(deviceId)).items).toEqual([])
    const answer = await listOf(await bring(world.a, text))
    expect(answer).toMatchObject({ quarantine: 'deviceRevoked', applied: true })
    expect(outcomes(answer)).toEqual(Array(5).fill('quarantined'))
    expect(answer.photos).toMatchObject([{ hash, outcome: 'quarantined' }])
    expect(await asShop(world.a.id, (tx) => listLog(tx, jobId))).toEqual([])
    expect(await asShop(world.a.id, (tx) => findPhoto(tx, hash))).toBeUndefined()
    const { items } = await desk.phone(deviceId)
    expect(items.map((item) => [item.kind, item.decision, item.file?.here])).toEqual([
      ['machine.add', null, undefined],
      ['job.open', null, undefined],
      ['log.add', null, undefined],
      ['log.add', null, true],
      ['log.add', null, undefined],
    ])
    const again = await listOf(await bring(world.a, text))
    expect([...outcomes(again), again.photos[0]?.outcome]).toEqual(Array(6).fill('already'))
    const trail = await asShop(world.a.id, (tx) => listAudit(tx, null))
    const [brought] = trail.filter(
      (one) => one.action === 'unsent.imported' && one.entityId === deviceId,
    )
    expect(brought?.detail).toMatchObject({ records: 5, quarantined: 5, taken: 0, refused: 0 })
  })

  it('[IM4] [Q5] [Q6] waits for the owner: accepted it lands once, also when the phone sends it later', async () => {
    const { text, desk, deviceId, jobId, hash, phone, line } = await ofRevoked()
    await bring(world.a, text)
    const { items } = await desk.phone(deviceId)
    const refuse = {
      decision: 'refuse',
      opId: items.at(-1)?.opId,
      reason: 'Given up by its writer',
    }
    expect(await desk.decided(deviceId, refuse)).toMatchObject([{ is: 'refused' }])
    const all = await desk.decided(deviceId, { decision: 'accept', opId: null })
    expect(all.map((one) => one.is)).toEqual(Array(4).fill('accepted'))
    line.fault = 'none'
    await phone.sync()
    const log = await asShop(world.a.id, (tx) => listLog(tx, jobId))
    expect(log.map((row) => [row.order, row.body.kind, row.deviceId])).toEqual([
      [1, 'note', deviceId],
      [2, 'photo', deviceId],
    ])
    expect(await asShop(world.a.id, (tx) => findPhoto(tx, hash))).toMatchObject({ jobId })
    const late = await listOf(await bring(world.a, text))
    expect(outcomes(late)).toEqual(['already', 'already', 'already', 'already', 'already'])
  })

  it('[IM4] of somebody who left goes the same way; a forged one is refused whole', async () => {
    const { fileOf, phone } = await stranded(world.b, 'second')
    const text = await fileOf()
    const personId = phone.phone.actor.personId
    await asShop(world.b.id, async (tx) => {
      await revokeMembership(tx, { personId, now: new Date().toISOString() })
      await takeChanges(tx, [{ entity: 'person', id: personId, jobId: null }])
    })
    const forged = text.replace('Plug was wet', 'Plug was dry')
    expect(await problemOf(await bring(world.b, forged))).toMatchObject({ kind: 'changedFile' })
    const desk = deskOf((await signIn(world.b, 'owner')).cookie)
    expect((await desk.phone(phone.phone.deviceId)).items).toEqual([])
    const answer = await listOf(await bring(world.b, text))
    expect(answer.quarantine).toBe('membershipEnded')
    expect((await desk.phone(phone.phone.deviceId)).items).toHaveLength(4)
  })
})
