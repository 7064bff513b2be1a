import { describe, expect, test } from 'vitest'
import { inProcessLock, type Lock } from '@/lib/ports/lock'
import { sendInBackground } from '@/lib/sync/client/background'
import { DeviceDb, setCurrent } from '@/lib/sync/client/device-db'
import { backoffMs } from '@/lib/sync/client/phone-sender'
import { jobOpen, machineAdd } from '../../support/field-ops'
import { createPhone, MECHANIC, newIndexed, testClock } from '../../support/phone'
import { atWork, note, outbox, photoOf, states } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

/** A timer whose alarms the test rings itself. */
function handTimer() {
  const alarms: { ms: number; run: () => void; off: boolean }[] = []
  return {
    alarms,
    after(ms: number, run: () => void) {
      const alarm = { ms, run, off: false }
      alarms.push(alarm)
      return () => {
        alarm.off = true
      }
    },
    /** Rings the last alarm that is on and longer than the heartbeat's. */
    ring(): number {
      const alarm = alarms.findLast((one) => !one.off && one.ms !== 15_000)
      if (alarm === undefined) throw new Error('no alarm is set')
      alarm.off = true
      alarm.run()
      return alarm.ms
    },
  }
}

describe('the sender', () => {
  test('[P16] waits up to twice as long after each failure, from 1 s to 5 min, and anywhere below', () => {
    expect([1, 2, 3, 8, 9, 40].map((failures) => backoffMs(failures, 0.999_999))).toEqual(
      [2_000, 4_000, 8_000, 256_000, 300_000, 300_000].map((ms) => ms * 0.999_999),
    )
    expect(backoffMs(9, 0)).toBe(0)
    expect(backoffMs(9, 0.5)).toBe(150_000)
  })

  test('[P16] [P20] tries again by its timer, and a tap or signal starts over', async () => {
    const timer = handTimer()
    const shop = new ShopDouble()
    const clock = testClock()
    const { phone, machine, job, jobId } = await atWork(shop, { timer, clock })
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job])
    const waits: number[] = []
    for (let tries = 0; tries < 4; tries += 1) {
      waits.push(timer.ring())
      await phone.phone.sender.idle()
    }
    expect(waits).toEqual([1_000, 2_000, 4_000, 8_000])
    // A record made meanwhile does not hurry a line that has just failed.
    let calls = 0
    shop.fault = () => {
      calls += 1
      return { noLine: true }
    }
    await phone.record([note(phone, jobId, 'One')])
    expect(calls).toBe(0)
    clock.pass(6_000)
    await phone.record([note(phone, jobId, 'Two')])
    expect(calls).toBe(1)
    phone.phone.sender.poke('online')
    await phone.phone.sender.idle()
    expect(timer.ring()).toBe(1_000)
    await phone.phone.sender.idle()
    shop.fault = () => null
    timer.ring()
    await phone.phone.sender.idle()
    expect(shop.ops.size).toBe(4)
    // Idle: one small look at the shop about every minute.
    expect(timer.ring()).toBe(60_000)
    await phone.phone.sender.idle()
    expect(shop.requests.at(-1)).toMatchObject({ ops: 0 })
  })

  test('[fault 3] [P19] of two tabs one sends at a time, and each op goes once', async () => {
    const shop = new ShopDouble()
    const shared = inProcessLock()
    let inside = 0
    let most = 0
    const lock: Lock = {
      run: (name, work, stale) =>
        shared.run(
          name,
          async () => {
            inside += 1
            most = Math.max(most, inside)
            await work()
            inside -= 1
          },
          stale,
        ),
    }
    const indexed = newIndexed()
    const { phone: one, machine, job, jobId } = await atWork(shop, { indexed, lock })
    const two = await createPhone({ fetch: shop.fetch, ports: { indexed, lock } })
    await one.phone.record([machine, job])
    await Promise.all(
      [one, two, one, two].map((tab, index) => tab.record([note(tab, jobId, `Note ${index}`)])),
    )
    await Promise.all([one.sync(), two.sync()])
    expect(most).toBe(1)
    expect(shop.ops.size).toBe(6)
    expect([...shop.seenDseqs].sort((a, b) => a - b)).toEqual([1, 2, 3, 4, 5, 6])
    expect(await states(one)).toEqual(Array.from({ length: 6 }, () => 'done'))
  })

  test('[fault 3] [P4] [P19] without a lock two tabs send twice and the shop has each op once', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const { phone: one, machine, job } = await atWork(shop, { indexed })
    const two = await createPhone({ fetch: shop.fetch, ports: { indexed } })
    shop.fault = () => ({ noLine: true })
    await one.record([machine, job])
    shop.fault = () => null
    await Promise.all([one.sync(), two.sync()])
    expect(shop.ops.size).toBe(2)
    expect(shop.rowsOf('job')).toHaveLength(1)
    expect(await states(one)).toEqual(['done', 'done'])
    expect(await one.rows('job')).toHaveLength(1)
  })

  test('[P3] [P15] 500 records go in one request of few bytes', async () => {
    const shop = new ShopDouble()
    const { phone, machine, job, jobId } = await atWork(shop)
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job])
    const notes = Array.from({ length: 498 }, (_, index) => note(phone, jobId, `Note ${index}`))
    await phone.record(notes)
    shop.fault = () => null
    await phone.sync()
    expect(shop.ops.size).toBe(500)
    expect(shop.requests.map((request) => request.ops).filter((ops) => ops > 0)).toEqual([500])
    expect(shop.requests[0]?.bytes).toBeLessThan(64 * 1024)
  })

  test('[P15] what was cut under way goes in halves, down to 25, and grows again', async () => {
    const shop = new ShopDouble()
    const clock = testClock()
    const { phone, machine, job, jobId } = await atWork(shop, { clock })
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job, ...Array.from({ length: 98 }, () => note(phone, jobId, 'x'))])
    shop.fault = () => {
      clock.pass(9_000)
      return { noLine: true }
    }
    for (let tries = 0; tries < 6; tries += 1) await phone.sync()
    shop.fault = () => null
    await phone.sync()
    expect(shop.requests.map((request) => request.ops)).toEqual([25, 50, 25])
  })

  test('[fault 12] [P20] [P18] the worker sends what is unsent, for each person under their own name', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const device = new DeviceDb(indexed)
    const { phone: one, machine, job, jobId } = await atWork(shop, { indexed })
    const second = {
      ...MECHANIC,
      personId: '01980000-0000-7000-8000-000000000106',
      name: 'Jory Fenn',
    }
    const two = await createPhone({ fetch: shop.fetch, ports: { indexed, actor: second } })
    await two.phone.enrol()
    await setCurrent(device, MECHANIC, 1)
    await setCurrent(device, second, 2)
    device.close()
    shop.fault = () => ({ noLine: true })
    await one.record([machine, job, note(one, jobId, 'First hand')], { photos: [photoOf(jobId)] })
    const other = machineAdd()
    await two.record([other, jobOpen(other.fields.id)])
    one.kill()
    two.kill()
    await expect(sendInBackground(one.ports, indexed)).rejects.toMatchObject({
      kind: 'stillUnsent',
    })
    shop.fault = () => null
    await sendInBackground(one.ports, indexed)
    expect(shop.ops.size).toBe(5)
    expect(shop.photos.size).toBe(1)
    const persons = new Set(shop.senders)
    expect(persons).toEqual(new Set([MECHANIC.personId, second.personId]))
    const again = await createPhone({ fetch: shop.fetch, ports: { indexed } })
    expect(await states(again)).toEqual(['taken', 'taken', 'taken'])
    expect(await again.see(again.phone.log(jobId))).toMatchObject([{ sent: true, order: null }])
    await again.sync()
    expect(await again.see(again.phone.log(jobId))).toMatchObject([{ sent: true, order: 1 }])
    expect((await outbox(again)).every((record) => record.unsettled === 0)).toBe(true)
  })

  test('a move the worker had refused is taken back when the app opens', async () => {
    const shop = new ShopDouble()
    const indexed = newIndexed()
    const device = new DeviceDb(indexed)
    await setCurrent(device, MECHANIC, 1)
    device.close()
    const { phone: one, machine, job, jobId } = await atWork(shop, { indexed })
    await one.record([machine, job])
    shop.fault = () => ({ noLine: true })
    await one.record([
      { kind: 'job.move', jobId, fields: { from: 'open', to: 'underWay', reason: null } },
    ])
    expect(await one.rows('job')).toMatchObject([{ state: 'underWay' }])
    one.kill()
    shop.fault = () => null
    shop.refuse = (op) => ({
      opId: op.id,
      result: 'rejected',
      code: 'stale_status',
      field: null,
      detail: 'assigned',
    })
    await sendInBackground(one.ports, indexed)
    const again = await createPhone({ fetch: shop.fetch, ports: { indexed } })
    expect(await again.rows('job')).toMatchObject([{ state: 'open' }])
    expect((await again.see(again.phone.unsent)).stuckCount).toBe(1)
  })
})
