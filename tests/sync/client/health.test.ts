import { describe, expect, test } from 'vitest'
import { networkOf } from '@/lib/ports/network'
import { stalledOf } from '@/lib/sync/client/health'
import type { UnsentItem, UnsentView } from '@/lib/sync/client/views'
import { AlarmClock, quiet } from '../../support/alarm-clock'
import { createPhone } from '../../support/phone'
import { atWork, note, photoOf } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

const MINUTE = 60_000
const item = (of: Partial<UnsentItem>) =>
  ({ state: 'waiting', since: '2026-11-24T18:00:00.000Z', ...of }) as UnsentItem
const halfPast = Date.UTC(2026, 10, 24, 18, 30)
const line = { signal: true, signalSinceMs: 0, movedMs: 0, nowMs: halfPast }
const dead = { running: null, reached: false, need: null }

describe('[P24] health is judged by what moves', () => {
  test('is silent below a quarter of an hour, and speaks above', () => {
    const at = (minutes: number) => ({ ...line, nowMs: Date.UTC(2026, 10, 24, 18, minutes) })
    expect(stalledOf([item({})], dead, at(15))).toBeNull()
    expect(stalledOf([item({})], dead, at(16))).toEqual({
      sinceAt: '2026-11-24T18:00:00.000Z',
      why: 'the phone has a network, but the shop does not answer',
    })
  })

  test('is silent without signal, with nothing waiting, and while things move', () => {
    expect(stalledOf([item({})], dead, { ...line, signal: false })).toBeNull()
    expect(stalledOf([], dead, line)).toBeNull()
    expect(stalledOf([item({ state: 'stuck' }), item({ state: 'blocked' })], dead, line)).toBeNull()
    expect(stalledOf([item({})], dead, { ...line, movedMs: halfPast - 5 * MINUTE })).toBeNull()
    // Signal has just come back after hours: the first try is still under way.
    expect(stalledOf([item({})], dead, { ...line, signalSinceMs: halfPast - 10_000 })).toBeNull()
  })

  test('says why as far as it is known', () => {
    const why = (state: Parameters<typeof stalledOf>[1]) =>
      stalledOf([item({ state: 'sending' })], state, line)?.why
    expect(why({ running: { done: 0, total: 1 }, reached: true, need: null })).toMatch(/under way/)
    expect(why({ running: null, reached: true, need: null })).toMatch(/takes nothing/)
    expect(why({ running: null, reached: true, need: 'updateApp' })).toMatch(/newer version/)
  })

  test('the network says online, every call hangs and nothing moves: it is flagged', async () => {
    const time = new AlarmClock()
    const timer = time.timer()
    const shop = new ShopDouble()
    const { phone: first, machine, job, jobId } = await atWork(shop, { clock: { now: time.now } })
    first.kill()
    const network = networkOf({
      // Accepts the request and is never heard of again.
      fetch: () => new Promise(() => undefined),
      online: () => true,
      timer,
    })
    const phone = await createPhone({
      fetch: shop.fetch,
      ports: { indexed: first.indexed, clock: { now: time.now }, timer, network },
    })
    phone.phone.sender.poke('open')
    void phone.phone.record([machine, job, note(phone, jobId, 'Kept')])
    let view: UnsentView | null = null
    const leave = phone.phone.unsent.subscribe(() => {
      view = phone.phone.unsent.get()
    })
    const stalled = () => (view as UnsentView | null)?.stalled
    await time.pass(14 * MINUTE, () => quiet(8))
    expect((view as UnsentView | null)?.count).toBe(3)
    expect(stalled()).toBeNull()
    await time.pass(2 * MINUTE, () => quiet(8))
    expect(stalled()).toMatchObject({
      sinceAt: new Date(Date.UTC(2026, 10, 24, 18, 40)).toISOString(),
    })
    leave()
    phone.kill()
  })

  test('blocked work says on what it waits', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.refuse = (op) =>
      op.kind === 'job.open'
        ? { opId: op.id, result: 'rejected', code: 'forbidden', field: null, detail: null }
        : op.kind === 'log.add'
          ? { opId: op.id, result: 'blocked', on: jobId }
          : null
    await phone.record([machine, job, note(phone, jobId, 'Child')])
    const { items } = await phone.see(phone.phone.unsent)
    expect(items.map((one) => one.waitsFor ?? one.reason)).toEqual([
      'Your roles in this shop do not allow this.',
      { what: 'New job', isStuck: true },
    ])
  })

  test('[P23] what is stuck shows its words, its size and since when, also of a photo', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job, note(phone, jobId, 'Plug was wet')], {
      photos: [photoOf(jobId)],
    })
    const { items } = await phone.see(phone.phone.unsent)
    expect(
      items.map((one) => [
        typeof one.what === 'string' ? one.what : one.what.kind,
        one.words,
        one.bytes > 0,
        one.since,
      ]),
    ).toEqual([
      ['Machine', 'Tarnholt\nMoor 450', true, '2026-11-24T18:40:00.000Z'],
      ['New job', expect.stringContaining('Starts, runs'), true, '2026-11-24T18:40:00.000Z'],
      ['note', 'Plug was wet', true, '2026-11-24T18:40:00.000Z'],
      ['Photo', null, true, '2026-11-24T18:40:00.000Z'],
    ])
  })
})
