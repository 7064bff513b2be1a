import { v7 } from 'uuid'
import { describe, expect, test } from 'vitest'
import type { Job } from '@/lib/model/job'
import { readMeta } from '@/lib/sync/client/phone-db'
import { createPhone, newIndexed } from '../../support/phone'
import { atWork, killer, note, states } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

/** Syncs a phone that dies at step `at`; then a fresh start ends in the same state. False: it outlived them. */
async function killedWhileSyncing(at: number): Promise<boolean> {
  const shop = new ShopDouble()
  shop.pageRows = 2
  shop.put('person', PERSON.id, PERSON)
  const indexed = newIndexed()
  const { phone: first, machine, job, jobId } = await atWork(shop, { indexed })
  shop.fault = () => ({ noLine: true })
  await first.record([machine, job, note(first, jobId, 'Coil was wet')])
  first.kill()
  shop.fault = () => null

  const death = killer(at)
  const dying = await createPhone({ fetch: shop.fetch, ports: { indexed, step: death.step } })
  await dying.sync().catch(() => undefined)
  const cursor = (await readMeta(dying.phone.core.db, 'cursor'))?.seq ?? 0
  const held = await dying.phone.core.db.row.filter((row) => row.seq !== null).toArray()
  expect(held.map((row) => row.seq).sort()).toEqual(Array.from({ length: cursor }, (_, i) => i + 1))
  dying.kill()

  const after = await createPhone({ fetch: shop.fetch, ports: { indexed } })
  await after.sync()
  expect(shop.ops.size).toBe(3)
  expect(await states(after)).toEqual(['done', 'done', 'done'])
  expect(await after.rows('person')).toEqual([PERSON])
  expect(await after.see(after.phone.log(jobId))).toMatchObject([{ sent: true, order: 1 }])
  after.kill()
  return death.died()
}

const PERSON = { id: '01980000-0000-7000-8000-000000000102', name: 'Ansel Quay', roles: ['guide'] }

describe('the phone takes what the shop has', () => {
  test('[P9] keeps unsent moves on top of what the shop sends, and lets a stale one go', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job])
    await phone.sync()
    shop.refuse = (op) => (op.kind === 'job.move' ? { opId: op.id, result: 'retry' } : null)
    await phone.record([
      { kind: 'job.move', jobId, fields: { from: 'open', to: 'underWay', reason: null } },
    ])
    await phone.sync()
    const other = shop.row('job', jobId) as Job
    shop.put('job', jobId, { ...other, assignedTo: [v7()] }, jobId)
    await phone.sync()
    const [rebased] = (await phone.rows('job')) as Job[]
    expect(rebased).toMatchObject({ state: 'underWay', number: 'J-1' })
    expect(rebased?.assignedTo).toHaveLength(1)
    shop.put('job', jobId, { ...other, state: 'closed' }, jobId)
    shop.refuse = (op) => ({
      opId: op.id,
      result: 'rejected',
      code: 'stale_status',
      field: null,
      detail: 'closed',
    })
    await phone.sync()
    expect(await phone.rows('job')).toMatchObject([{ state: 'closed' }])
    expect((await phone.see(phone.phone.unsent)).items[0]?.reason).toBe(
      'The shop has moved this on in the meantime. It now stands at: closed.',
    )
  })

  test('[P9] a second sync of the same moves no row', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job, note(phone, jobId, 'Once')])
    await phone.sync()
    const before = await phone.phone.core.db.row.toArray()
    await phone.sync()
    expect(await phone.phone.core.db.row.toArray()).toEqual(before)
    expect(shop.requests.at(-1)?.ops).toBe(0)
  })

  test('[fault 27] [P12] offers its work again after the shop was restored from a backup', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    await phone.record([machine, job, note(phone, jobId, 'Before'), note(phone, jobId, 'After')])
    await phone.sync()
    const lost = [...shop.ops.values()].at(-1)
    shop.restoreWithout([lost?.id ?? ''])
    await phone.sync()
    expect(shop.ops.has(lost?.id ?? '')).toBe(true)
    expect(shop.rowsOf('logEntry')).toHaveLength(2)
    expect((await phone.see(phone.phone.unsent)).count).toBe(0)
  })

  test('[P8] [P4] killed at any step of a sync, page and cursor and results stand or fall together', async () => {
    let at = 1
    while (await killedWhileSyncing(at)) at += 1
    expect(at).toBeGreaterThan(20)
  })

  test('[P10] a reset keeps unsent work and drops what the shop no longer shows', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.put('person', '01980000-0000-7000-8000-000000000199', {
      id: '01980000-0000-7000-8000-000000000199',
      name: 'Old Hand',
      roles: ['guide'],
    })
    await phone.record([machine, job])
    await phone.sync()
    shop.refuse = (op) => ({ opId: op.id, result: 'retry' })
    await phone.record([note(phone, jobId, 'Unsent')])
    shop.remove('person', '01980000-0000-7000-8000-000000000199')
    shop.scopeVersion += 1
    shop.pageRows = 1
    await phone.sync()
    expect(await phone.rows('person')).toHaveLength(0)
    expect(await phone.rows('job')).toHaveLength(1)
    expect(await phone.see(phone.phone.log(jobId))).toMatchObject([{ sent: false }])
    expect((await states(phone)).at(-1)).toBe('waiting')
  })

  test('[P8] an unknown entity is passed over, an unreadable row is set aside and counted', async () => {
    const { shop, phone } = await atWork()
    shop.put('starChart', v7(), { anything: true })
    shop.put('person', v7(), { id: 'not an id', name: 4 })
    const id = v7()
    shop.put('person', id, { id, name: 'Ansel Quay', roles: ['guide'], fromTheFuture: 1 })
    await phone.sync()
    expect(await phone.rows('person')).toEqual([{ id, name: 'Ansel Quay', roles: ['guide'] }])
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ setAside: 1 })
    expect((await readMeta(phone.phone.core.db, 'cursor'))?.seq).toBe(3)
  })

  test('two phones see each other’s work through the shop', async () => {
    const shop = new ShopDouble()
    const first = await atWork(shop)
    const second = await createPhone({
      fetch: shop.fetch,
      name: 'two',
      ports: { indexed: newIndexed() },
    })
    await second.phone.enrol()
    await first.phone.record([first.machine, first.job])
    await first.phone.sync()
    await second.sync()
    await second.record([note(second, first.jobId, 'From the other phone')])
    await second.sync()
    await first.phone.record([note(first.phone, first.jobId, 'From the first')])
    await first.phone.sync()
    await second.sync()
    const logs = [
      await first.phone.see(first.phone.phone.log(first.jobId)),
      await second.see(second.phone.log(first.jobId)),
    ]
    expect(logs[0]).toEqual(logs[1])
    expect(logs[0]?.map((line) => line.order)).toEqual([1, 2])
  })
})
