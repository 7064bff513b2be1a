import { describe, expect, test } from 'vitest'
import type { Job } from '@/lib/model/job'
import type { OpInput } from '@/lib/sync/protocol/op'
import { createPhone, type TestPhone } from '../../support/phone'
import { atWork, killer, note, outbox, photoOf } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

const move = (jobId: string, from: 'open' | 'assigned', to: 'underWay' | 'open'): OpInput => ({
  kind: 'job.move',
  jobId,
  fields: { from, to, reason: null },
})

/** A job whose state the desk has changed before this phone's own step arrived. */
async function overtaken(deskState: Job['state'], shop = new ShopDouble()) {
  const world = await atWork(shop)
  const { phone, machine, job, jobId } = world
  await phone.record([machine, job])
  shop.fault = () => ({ noLine: true })
  await phone.record([move(jobId, 'open', 'underWay')])
  shop.put('job', jobId, { ...(shop.row('job', jobId) as object), state: deskState }, jobId)
  shop.refuse = (op) => {
    const now = (shop.row('job', jobId) as Job).state
    return op.kind === 'job.move' && op.fields.from !== now
      ? { opId: op.id, result: 'rejected', code: 'stale_status', field: 'from', detail: now }
      : null
  }
  shop.fault = () => null
  await phone.sync()
  return world
}
const stuckOf = async (of: TestPhone) =>
  (await outbox(of)).find((record) => record.state === 'stuck')

describe('[P16] what is stuck has a way out', () => {
  test('[fault 16] a refused step is done again from where things stand, by one key', async () => {
    const { shop, phone, jobId } = await overtaken('assigned')
    expect((await phone.see(phone.phone.unsent)).items[0]).toMatchObject({
      state: 'stuck',
      code: 'stale_status',
      reason: 'The shop has moved this on in the meantime. It now stands at: assigned.',
    })
    const stuck = await stuckOf(phone)
    expect(await phone.phone.redo(stuck?.opId ?? '')).toEqual({ ok: true, value: null })
    await phone.phone.sender.idle()
    expect(shop.row('job', jobId)).toMatchObject({ state: 'underWay' })
    const view = await phone.see(phone.phone.unsent)
    expect(view).toMatchObject({ count: 0, stuckCount: 0, letGoCount: 1 })
    const again = [...shop.ops.values()].findLast((op) => op.kind === 'job.move')
    expect(again).toMatchObject({ fields: { from: 'assigned', to: 'underWay' } })
    expect(again?.id).not.toBe(stuck?.opId)
  })

  test.each([
    ['closed', 'It now stands at “closed”, and from there it cannot go to “under way”.'],
    ['underWay', 'It stands at “under way” already. You can let this go.'],
  ] as const)('where the desk made it %s, it says why it cannot', async (state, words) => {
    const { phone } = await overtaken(state)
    const stuck = await stuckOf(phone)
    expect(await phone.phone.redo(stuck?.opId ?? '')).toEqual({ ok: false, problem: { words } })
    expect((await phone.see(phone.phone.unsent)).stuckCount).toBe(1)
  })

  test('[P1] killed at any step of it, the old step or the new one is there, never both or none', async () => {
    let at = 1
    for (;;) {
      const { shop, phone } = await overtaken('assigned')
      const stuck = await stuckOf(phone)
      shop.fault = () => ({ noLine: true })
      phone.kill()
      const death = killer(at)
      const dying = await createPhone({
        fetch: shop.fetch,
        ports: { indexed: phone.indexed, step: death.step },
      })
      await dying.phone.redo(stuck?.opId ?? '').catch(() => undefined)
      await dying.phone.sender.idle().catch(() => undefined)
      dying.kill()
      const after = await createPhone({ fetch: shop.fetch, ports: { indexed: phone.indexed } })
      const moves = (await outbox(after)).filter((record) => record.kind === 'job.move')
      const letGo = await after.phone.core.db.letGo.count()
      expect([moves.length, letGo, moves[0]?.state]).toEqual(
        letGo === 0 ? [1, 0, 'stuck'] : [1, 1, 'waiting'],
      )
      after.kill()
      if (!death.died()) break
      at += 1
    }
    expect(at).toBeGreaterThan(6)
  })

  test('letting go takes it off the screens, keeps it in the file, and nothing sends it again', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.refuse = (op) =>
      op.kind === 'log.add'
        ? { opId: op.id, result: 'rejected', code: 'forbidden', field: null, detail: null }
        : null
    await phone.record([machine, job, note(phone, jobId, 'Given up')])
    expect(await phone.see(phone.phone.log(jobId))).toHaveLength(1)
    const stuck = await stuckOf(phone)
    await phone.phone.letGo({ opId: stuck?.opId ?? '' })
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, letGoCount: 1 })
    expect(await phone.see(phone.phone.log(jobId))).toEqual([])
    const before = shop.requests.length
    await phone.sync()
    expect(shop.requests.slice(before).map((request) => request.ops)).toEqual([0])
    const [file] = await phone.phone.exportFiles()
    const body = JSON.parse(JSON.parse((await file?.text()) ?? '').body)
    expect(body.ops).toMatchObject([
      { state: 'letGo', op: { fields: { body: { words: 'Given up' } } } },
    ])
  })

  test('only what is stuck can be let go: what waits stays', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.fault = () => ({ noLine: true })
    const photo = photoOf(jobId)
    await phone.record([machine, job, note(phone, jobId, 'Waits')], { photos: [photo] })
    for (const record of await outbox(phone)) await phone.phone.letGo({ opId: record.opId })
    await phone.phone.letGo({ hash: photo.hash })
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 4, letGoCount: 0 })
    expect(await phone.phone.core.db.photoBytes.count()).toBe(1)
  })
})
