import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import { webLock } from '@/lib/ports/lock'
import { networkOf } from '@/lib/ports/network'
import { AlarmClock, quiet } from '../../support/alarm-clock'
import { createPhone, newIndexed, type TestFetch } from '../../support/phone'
import { atWork, note, states } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'
import { TestLocks } from '../../support/web-locks'

beforeEach(() => {
  vi.stubGlobal('navigator', { locks: new TestLocks() })
})
afterEach(() => {
  vi.unstubAllGlobals()
})

/** A page of one browser: it can be frozen, and then neither its timers nor its requests move. */
function pageOf(time: AlarmClock, fetch: TestFetch) {
  const page: { frozen: boolean; thaw: (() => void)[]; asked: number } = {
    frozen: false,
    thaw: [],
    asked: 0,
  }
  const timer = time.timer(() => page.frozen)
  const network = networkOf({
    fetch: async (input, init) => {
      page.asked += 1
      if (page.frozen) await new Promise<void>((resolve) => page.thaw.push(resolve))
      return fetch(String(input), init ?? {})
    },
    online: () => true,
    timer,
  })
  return { page, ports: { clock: { now: time.now }, timer, lock: webLock(timer), network } }
}

async function twoTabs() {
  const time = new AlarmClock()
  const shop = new ShopDouble()
  const indexed = newIndexed()
  const first = pageOf(time, shop.fetch)
  const second = pageOf(time, shop.fetch)
  const { phone: one, machine, job, jobId } = await atWork(shop, { ...first.ports, indexed })
  const two = await createPhone({ fetch: shop.fetch, ports: { ...second.ports, indexed } })
  return { time, shop, first, second, one, two, machine, job, jobId }
}

describe('[P19] whose turn it is', () => {
  test('[fault 23] a leader frozen in the middle of a request loses its turn within 60 s', async () => {
    const { time, shop, first, one, two, machine, job, jobId } = await twoTabs()
    await time.pass(20_000, quiet)
    first.page.frozen = true
    const frozen = one.phone.record([machine, job])
    await quiet()
    expect(first.page.asked).toBeGreaterThan(0)
    two.phone.sender.poke('visible')
    await two.phone.record([note(two, jobId, 'From the second tab')])
    await time.pass(40_000, quiet)
    expect(shop.ops.size).toBe(0)
    await time.pass(20_000, quiet)
    // Sealing and signing take real time, of which a busy machine has little.
    await vi.waitFor(() => expect(shop.ops.size).toBe(3), 10_000)
    // The first tab wakes up and finishes what it had begun: nothing is there twice.
    first.page.frozen = false
    for (const wake of first.page.thaw) wake()
    await quiet()
    await frozen
    one.phone.sender.poke('visible')
    await time.pass(2_000, quiet)
    expect(shop.ops.size).toBe(3)
    expect(shop.rowsOf('job')).toHaveLength(1)
    await vi.waitFor(
      async () => expect(await states(two)).toEqual(['done', 'done', 'done']),
      10_000,
    )
    one.kill()
    two.kill()
  })

  test('[fault 23] a page that says it is being frozen hands its turn on at once', async () => {
    const { time, shop, first, one, two, machine, job } = await twoTabs()
    first.page.frozen = true
    const frozen = one.phone.record([machine, job])
    await quiet()
    one.phone.sender.yieldTurn()
    two.phone.sender.poke('visible')
    await time.pass(6_000, quiet)
    expect(shop.ops.size).toBe(2)
    for (const wake of first.page.thaw) wake()
    await frozen
    one.kill()
    two.kill()
  })

  test('[fault 23] a killed leader leaves its turn free: the other sends at once', async () => {
    const time = new AlarmClock()
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const dying = pageOf(time, shop.fetch)
    const { phone: one, machine, job } = await atWork(shop, { ...dying.ports, indexed })
    dying.page.frozen = true
    await one.phone.record([machine, job])
    await quiet()
    // A browser drops the locks of a page that is gone.
    vi.stubGlobal('navigator', { locks: new TestLocks() })
    const living = pageOf(time, shop.fetch)
    const two = await createPhone({ fetch: shop.fetch, ports: { ...living.ports, indexed } })
    two.phone.sender.poke('open')
    await time.pass(0, quiet)
    expect(shop.ops.size).toBe(2)
    two.kill()
    one.kill()
  })

  test('[P16] a tap during a dying try is tried anew when that one has failed', async () => {
    const { shop, phone, machine, job } = await atWork(new ShopDouble())
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job])
    shop.fault = () => null
    const failing: (() => void)[] = []
    let calls = 0
    const gate = await createPhone({
      ports: { indexed: phone.indexed },
      fetch: (path, init) => {
        calls += 1
        if (calls > 1) return shop.fetch(path, init)
        return new Promise((_, reject) => {
          failing.push(() => reject(new TypeError('Failed to fetch')))
        })
      },
    })
    const dying = gate.sync()
    await quiet()
    gate.phone.sender.poke('tap')
    for (const fails of failing) fails()
    await dying
    expect(calls).toBe(2)
    expect(shop.ops.size).toBe(2)
  })
})
