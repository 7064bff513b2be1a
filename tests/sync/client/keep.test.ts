import { describe, expect, test } from 'vitest'
import { openKeys } from '@/lib/sync/client/keys'
import { PhoneDb } from '@/lib/sync/client/phone-db'
import { jobOpen, machineAdd } from '../../support/field-ops'
import { createPhone, MECHANIC, newIndexed, type TestPhone } from '../../support/phone'
import { killer, note, outbox, photoOf } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

const noLine = () => Promise.reject(new TypeError('Failed to fetch'))

async function everything(of: TestPhone) {
  const { db } = of.phone.core
  return {
    ops: await db.outbox.toArray(),
    rows: await db.row.toArray(),
    photos: await db.photo.toArray(),
    drafts: await db.draft.toCollection().primaryKeys(),
  }
}

/** Keeps a note with photo and draft on a phone that dies at step `at`; false when it outlived the steps. */
async function killedWhileKeeping(at: number): Promise<boolean> {
  const indexed = newIndexed()
  const first = await createPhone({ fetch: noLine, ports: { indexed } })
  const machine = machineAdd()
  const job = jobOpen(machine.fields.id)
  await first.record([machine, job])
  const draft = first.phone.drafts.of('note')
  draft.set('Half a sen')
  await draft.written()
  first.kill()

  const death = killer(at)
  const dying = await createPhone({ fetch: noLine, ports: { indexed, step: death.step } })
  const { id: jobId } = job.fields
  const more = { photos: [photoOf(jobId)], clearDrafts: ['note'] }
  const outcome = await dying.phone.record([note(dying, jobId, 'Coil was wet')], more).then(
    () => 'kept',
    () => 'died',
  )
  await dying.phone.sender.idle().catch(() => undefined)
  dying.kill()

  const after = await createPhone({ fetch: noLine, ports: { indexed } })
  const found = await everything(after)
  const nothing = { ops: [1, 2], entries: 0, photos: 0, drafts: ['note'] }
  const all = { ops: [1, 2, 3], entries: 1, photos: 1, drafts: [] }
  expect({
    ops: found.ops.map((op) => op.dseq),
    entries: found.rows.filter((row) => row.entity === 'logEntry').length,
    photos: found.photos.length,
    drafts: found.drafts,
  }).toEqual(found.ops.length === 3 ? all : nothing)
  if (outcome === 'kept') expect(found.ops).toHaveLength(3)
  // The next number follows what is there: no hole after a kill (P2).
  await after.record([note(after, jobId, 'Next')])
  expect((await outbox(after)).at(-1)?.dseq).toBe(found.ops.length + 1)
  after.kill()
  return death.died()
}

describe('the phone keeps all of a record or nothing', () => {
  test('[P1] [PH1] killed at any step, row and op and photo and draft stand or fall together', async () => {
    let at = 1
    while (await killedWhileKeeping(at)) at += 1
    expect(at).toBeGreaterThan(12)
  })

  test('[P2] two tabs number their ops 1, 2, 3 without a hole or a double', async () => {
    const indexed = newIndexed()
    const tabs = await Promise.all([
      createPhone({ fetch: noLine, ports: { indexed } }),
      createPhone({ fetch: noLine, ports: { indexed } }),
    ])
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    await tabs[0].record([machine, job])
    await Promise.all(
      Array.from({ length: 20 }, (_, index) => {
        const tab = tabs[index % 2] as TestPhone
        return tab.phone.record([
          note(tab, job.fields.id, `One ${index}`),
          note(tab, job.fields.id, `Two ${index}`),
        ])
      }),
    )
    const records = await outbox(tabs[0])
    expect(records.map((record) => record.dseq)).toEqual(
      Array.from({ length: 42 }, (_, index) => index + 1),
    )
    expect(await tabs[1].see(tabs[1].phone.log(job.fields.id))).toHaveLength(40)
    const ops = await Promise.all(
      records.map((record) => tabs[0].phone.core.cache.op(tabs[0].phone.core.keys.outbox, record)),
    )
    const stamps = ops.map((op) => op.hlc)
    expect(stamps).toEqual([...new Set(stamps)].sort())
    expect(ops.map((op) => op.dseq)).toEqual(records.map((record) => record.dseq))
    expect(tabs[0].phone.deviceId).toBe(tabs[1].phone.deviceId)
  })

  test('[R22] nothing a person wrote stands open in the store', async () => {
    const shop = new ShopDouble()
    const phone = await createPhone({ fetch: shop.fetch })
    await phone.phone.enrol()
    const machine = machineAdd({ makerTyped: 'Quondamsecret' })
    const job = jobOpen(machine.fields.id, {
      complaint: { words: 'Quondamsecret', symptom: null, lampOn: null },
    })
    await phone.record([machine, job])
    shop.fault = () => ({ noLine: true })
    const photo = photoOf(job.fields.id)
    await phone.record([note(phone, job.fields.id, 'Quondamsecret')], { photos: [photo] })
    const draft = phone.phone.drafts.of('note')
    draft.set({ words: 'Quondamsecret' })
    await draft.written()
    const { db } = phone.phone.core
    const bytes: Buffer[] = []
    for (const table of db.tables) {
      for (const record of await table.toArray()) collect(record, bytes)
    }
    const raw = Buffer.concat(bytes)
    expect(raw.byteLength).toBeGreaterThan(2000)
    expect(raw.includes('Quondamsecret')).toBe(false)
    expect(raw.includes(Buffer.from(photo.bytes).subarray(0, 64))).toBe(false)
    expect(await phone.rows('machine')).toMatchObject([{ makerTyped: 'Quondamsecret' }])
  })

  test('[R22] a row moved to another place does not open', async () => {
    const phone = await createPhone({ fetch: noLine })
    await phone.record([machineAdd(), machineAdd()])
    const [one, other] = await phone.phone.core.db.row.toArray()
    await phone.phone.core.db.row.put({ ...one!, body: other!.body, turn: 99 })
    await expect(
      phone.phone.core.cache.row(
        phone.phone.core.keys,
        (await phone.phone.core.db.row.get(one!.key))!,
      ),
    ).rejects.toMatchObject({ name: 'OperationError' })
  })

  test('[R22] no key of the store can be taken out by a script', async () => {
    const db = new PhoneDb(MECHANIC.shopId, MECHANIC.personId, newIndexed())
    const [first, second] = await Promise.all([openKeys(db), openKeys(db)])
    await expect(crypto.subtle.exportKey('pkcs8', first.device.privateKey)).rejects.toThrow()
    await expect(crypto.subtle.exportKey('raw', first.outbox)).rejects.toThrow()
    await expect(crypto.subtle.exportKey('raw', first.store)).rejects.toThrow()
    const publicKeys = await Promise.all(
      [first, second].map((keys) => crypto.subtle.exportKey('jwk', keys.device.publicKey)),
    )
    expect(publicKeys[0]).toEqual(publicKeys[1])
    db.close()
  })

  test('a record of a wrong shape is refused and nothing of it is kept', async () => {
    const phone = await createPhone({ fetch: noLine })
    const machine = machineAdd({ year: 1800 })
    await expect(phone.record([machineAdd(), machine])).rejects.toMatchObject({ kind: 'badRecord' })
    expect(await everything(phone)).toMatchObject({ ops: [], rows: [] })
  })
})

/** Every byte and word of a stored record, as it lies in the store. */
function collect(value: unknown, into: Buffer[]): void {
  if (value instanceof Uint8Array) into.push(Buffer.from(value))
  else if (value instanceof ArrayBuffer) into.push(Buffer.from(new Uint8Array(value)))
  else if (typeof value === 'string') into.push(Buffer.from(value))
  else if (typeof value === 'object' && value !== null && !(value instanceof CryptoKey)) {
    for (const part of Object.values(value)) collect(part, into)
  }
}
