// The product's own store and sender in the bench's page, untouched: only its ports are the bench's, so
// that the records lie days apart and nothing is sent before its time.
import { v7 } from 'uuid'
import { systemClock, systemTimer } from '@/lib/ports/clock'
import { inProcessLock } from '@/lib/ports/lock'
import { browserSyncPorts, type SyncPorts } from '@/lib/ports/sync-ports'
import { Phone } from '@/lib/sync/client/phone'
import { readMeta, writeMeta } from '@/lib/sync/client/phone-db'
import { hlcAt } from '@/lib/sync/protocol/hlc'
import { offer, type Task } from './arm'

let phone: Phone | null = null
let tripMs: number | null = null
let held = false

const lock = inProcessLock()
const clock = { now: () => tripMs ?? systemClock.now() }
const ports: SyncPorts = {
  ...browserSyncPorts,
  clock,
  timer: { after: (delayMs, run) => (held ? () => undefined : systemTimer.after(delayMs, run)) },
  ids: { next: () => v7({ msecs: clock.now() }), share: Math.random },
  lock: {
    run: (name, work, stale) => (held ? Promise.resolve() : lock.run(name, work, stale)),
  },
}

async function open({ actor }: Task): Promise<Phone> {
  const opened = await Phone.open({
    actor,
    ports,
    failed: (cause) => {
      throw cause
    },
  })
  const known = await opened.enrol()
  if (!known.ok) throw new Error(`not enrolled: ${known.problem.kind}`)
  phone = opened
  return opened
}

const opened = (): Phone => {
  if (phone === null) throw new Error('no phone')
  return phone
}

offer('product', {
  async fill(task) {
    const own = await open(task)
    await own.sender.sendNow('tap')
    // As if that first exchange had been before the trip.
    const { db } = own.core
    const counter = (await readMeta(db, 'stamp')) ?? { dseq: 0 }
    const beganMs = Date.parse(task.records[0]?.happenedAt ?? '')
    await writeMeta(db, 'stamp', { dseq: counter.dseq, hlc: hlcAt(beganMs - 60_000) })
    held = true
    for (const { jobId, happenedAt, body } of task.records) {
      tripMs = Date.parse(happenedAt)
      await own.record([own.entry(jobId, body, { bookVersion: 1 })])
    }
    tripMs = null
    held = false
    await own.sender.idle()
  },
  async push() {
    const { sender, core } = opened()
    await sender.sendNow('tap')
    const left = await core.db.outbox.where('state').noneOf(['taken', 'done']).count()
    if (left > 0) throw new Error(`${left} unsent`)
  },
  async fresh(task) {
    await open(task)
  },
  async pull() {
    const { sender, core } = opened()
    await sender.sendNow('tap')
    return await core.db.row.where('entity').equals('logEntry').count()
  },
})
