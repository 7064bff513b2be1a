// Faults 2, 8, 9 and 10 of the fault list: the phone's own program against the shop's real routes.
import { createHash } from 'node:crypto'
import { existsSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { gunzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listLog } from '@/db/queries/log-entries'
import { openOp, opPlace } from '@/lib/sync/client/core'
import { sealJson } from '@/lib/sync/client/seal'
import { jobOpen, logAdd, machineAdd, note as noteBody } from '../support/field-ops'
import { recordPastGate } from '../support/past-gate'
import type { TestFetch, TestPhone } from '../support/phone'
import { note } from '../support/phone-world'
import { jpegOf } from '../support/pictures'
import { outboxOf, realPhone, statesOf } from '../support/real-phone'
import { openSyncWorld, phoneOf, type SyncWorld, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
const logOf = (jobId: string) => inA((tx) => listLog(tx, jobId))

/** A photo entry of a job and its bytes. */
function photoOf(of: TestPhone, jobId: string) {
  const bytes = Buffer.concat([jpegOf(), Buffer.from(jobId)])
  const hash = createHash('sha256').update(bytes).digest('hex')
  const photo = { hash, bytes: bytes.length, mime: 'image/jpeg', width: 1, height: 1 } as const
  const entry = of.phone.entry(jobId, { kind: 'photo', photo, caption: null }, { bookVersion: 1 })
  const kept = { hash, jobId, bytes: new Uint8Array(bytes).buffer, mime: 'image/jpeg' as const }
  return { hash, entry, kept }
}

it('[fault 2] [P4] [PH2] every answer lost, the page killed each time: each record once, one photo', async () => {
  const { phone, line, again } = await realPhone(world.a, 'mechanic')
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  const photo = photoOf(phone, jobId)
  line.fault = 'noLine'
  await phone.record([opening, note(phone, jobId, 'One'), note(phone, jobId, 'Two')])
  await phone.record([photo.entry], { photos: [photo.kept] })
  phone.kill()
  // The records are taken, the upload is begun, its bytes are taken: of each the phone never hears.
  const lost = ['/api/sync', '/api/photos/tus', `/api/photos/tus/${photo.hash}`]
  for (const path of lost) {
    line.fault = 'none'
    line.after = (asked) => {
      if (asked === path) line.fault = 'loseReply'
      return Promise.resolve()
    }
    const dying = await again()
    await dying.sync()
    expect(line.fault, path).toBe('loseReply')
    expect((await dying.see(dying.phone.unsent)).count).toBeGreaterThan(0)
    dying.kill()
  }
  line.fault = 'none'
  line.after = () => Promise.resolve()
  const last = await again()
  await last.sync()
  expect(await last.see(last.phone.unsent)).toMatchObject({ count: 0, stuckCount: 0 })
  expect((await logOf(jobId)).map((row) => row.body.kind)).toEqual(['note', 'note', 'photo'])
  const rows = await inA((tx) =>
    tx.selectFrom('photo').select('hash').where('jobId', '=', jobId).execute(),
  )
  expect(rows).toEqual([{ hash: photo.hash }])
  const folder = join(world.filesDir, world.a.id)
  expect(existsSync(join(folder, photo.hash))).toBe(true)
  expect(readdirSync(folder).filter((name) => name === photo.hash)).toHaveLength(1)
})

describe('[fault 8] one bad op in 500', () => {
  const KINDS: Record<string, [(op: Record<string, unknown>) => object, string]> = {
    invalid: [(op) => ({ ...op, fields: { ...(op.fields as object), zone: 7 } }), 'invalid'],
    'too big': [(op) => ({ ...op, note: 'x'.repeat(17_000) }), 'too_big'],
    'of an unknown kind': [(op) => ({ ...op, kind: 'job.eat' }), 'unknown_kind'],
    'that strikes an entry nobody has': [
      (op) => ({
        ...op,
        fields: {
          ...(op.fields as object),
          supersedes: world.a.machineId,
          body: { kind: 'correction', reason: 'Wrong' },
        },
      }),
      'blocked',
    ],
  }
  it.each(Object.entries(KINDS))(
    '[fault 8] [P5] %s: the other 499 are taken, it alone is told with its reason',
    async (_name, [spoil, code]) => {
      const { device } = await phoneOf(world.a, 'mechanic')
      const opening = jobOpen(world.a.machineId)
      await sync(device, [device.op(opening)])
      const ops = Array.from({ length: 500 }, (_, i) =>
        device.op(logAdd(device, opening.fields.id, noteBody(`n${i}`))),
      )
      const bad = spoil(ops[250] as unknown as Record<string, unknown>)
      const answer = await sync(
        device,
        ops.map((op, i) => (i === 250 ? bad : op)),
      )
      expect(
        answer.results.map((result) => ('code' in result ? result.code : result.result)),
      ).toEqual([code])
      expect(answer.results[0]?.opId).toBe(ops[250]?.id)
      expect(await logOf(opening.fields.id)).toHaveLength(499)
    },
  )

  it('[fault 8] [P16] [P23] on the phone it alone is set aside, with a reason, in the file, and can be let go', async () => {
    const { phone, line } = await realPhone(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    line.fault = 'noLine'
    await phone.record([opening])
    await phone.record(Array.from({ length: 59 }, (_, i) => note(phone, jobId, `n${i}`)))
    const { db, keys } = phone.phone.core
    const held = (await outboxOf(phone))[30]
    if (held === undefined) throw new Error('nothing is unsent')
    const op = await openOp(keys.outbox, held)
    const place = opPlace(op.dseq, op.id)
    const spoilt = { ...op, fields: { ...op.fields, zone: 'x'.repeat(200) } }
    await db.outbox.put({ ...held, op: await sealJson(keys.outbox, place, spoilt) })
    phone.phone.core.cache.forgetOps([op.id])
    line.fault = 'none'
    await phone.sync()
    expect(await logOf(jobId)).toHaveLength(58)
    const view = await phone.see(phone.phone.unsent)
    expect(view).toMatchObject({ count: 1, stuckCount: 1 })
    expect(view.items[0]).toMatchObject({
      opId: op.id,
      state: 'stuck',
      reason: 'The shop cannot read this record as it is.',
    })
    const [file] = await phone.phone.exportFiles()
    const body = JSON.parse(JSON.parse((await file?.text()) ?? '').body)
    expect(body.ops).toMatchObject([{ state: 'stuck', reason: 'invalid', op: { id: op.id } }])
    await phone.phone.letGo({ opId: op.id })
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, letGoCount: 1 })
  })
})

it('[fault 9] [P5] what hangs on a refused op waits, and goes when what it hangs on has come', async () => {
  const { phone } = await realPhone(world.a, 'guide')
  const machine = machineAdd()
  const opening = jobOpen(machine.fields.id)
  const jobId = opening.fields.id
  await recordPastGate(phone.phone, [machine, opening, note(phone, jobId, 'Child of a child')])
  await phone.sync()
  expect((await outboxOf(phone)).map((record) => [record.kind, record.state])).toEqual([
    ['machine.add', 'stuck'],
    ['job.open', 'blocked'],
    ['log.add', 'blocked'],
  ])
  await phone.sync()
  expect((await statesOf(phone)).filter((state) => state === 'blocked')).toHaveLength(2)
  const { device } = await phoneOf(world.a, 'mechanic')
  await sync(device, [device.op(machine)])
  await phone.sync()
  expect(await statesOf(phone)).toEqual(['stuck', 'done', 'done'])
  expect((await logOf(jobId)).map((row) => row.body)).toEqual([noteBody('Child of a child')])
})

it('[fault 10] [P15] [P16] a 413 halves the batch until it fits, and sets nothing aside', async () => {
  const sizes: number[] = []
  const through =
    (fetch: TestFetch): TestFetch =>
    (path, init) => {
      if (path !== '/api/sync') return fetch(path, init)
      const { ops } = JSON.parse(gunzipSync(init.body as Uint8Array).toString()) as { ops: [] }
      sizes.push(ops.length)
      // Some box on the way that lets no more through than that.
      return ops.length > 30
        ? Promise.resolve(new Response('too much', { status: 413 }))
        : fetch(path, init)
    }
  const { phone, line } = await realPhone(world.a, 'mechanic', { through })
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  line.fault = 'noLine'
  await phone.record([opening])
  await phone.record(Array.from({ length: 119 }, (_, i) => note(phone, jobId, `n${i}`)))
  sizes.length = 0
  line.fault = 'none'
  await phone.sync()
  expect(sizes.slice(0, 3)).toEqual([120, 60, 30])
  expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, stuckCount: 0 })
  expect(await logOf(jobId)).toHaveLength(119)
})

it('[R23] leaves every chain of the shop whole after all of this', async () => {
  expect(await expectWholeShop(world.a.id)).toBeGreaterThan(6)
})
