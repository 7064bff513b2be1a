// The phone's own store and sender in a bare page, untouched: only that nothing is sent before its time, and
// that each step of the store is told to the test, which holds it there and kills the browser.
import { browserSyncPorts, type SyncPorts } from '@/lib/ports/sync-ports'
import { Phone } from '@/lib/sync/client/phone'
import { readMeta } from '@/lib/sync/client/phone-db'
import type { NewPhoto } from '@/lib/sync/client/views'
import type { Kept, KillPage, PhotoText } from './kill-page'

let phone: Phone | null = null
let isHeld: boolean = true
let steps: string[] = []
let killAt = 0

const ports: SyncPorts = {
  ...browserSyncPorts,
  timer: { after: () => () => undefined },
  lock: {
    run: (name, work, stale) =>
      isHeld ? Promise.resolve() : browserSyncPorts.lock.run(name, work, stale),
  },
}

/** Stands still here, in the middle of whatever goes on, until the answer comes: from then on it may be dead. */
function step(name: string): void {
  steps.push(name)
  if (steps.length !== killAt) return
  const held = new XMLHttpRequest()
  held.open('POST', '/kill/here', false)
  held.send(name)
}

const opened = (): Phone => {
  if (phone === null) throw new Error('no phone')
  return phone
}

async function draft(key: string, value: unknown): Promise<void> {
  const half = opened().drafts.of(key)
  half.set(value)
  await half.written()
}

/** What is half written under a key, as a screen reads it. */
async function readDraft(key: string): Promise<unknown> {
  const half = opened().drafts.of(key)
  await half.written()
  return half.watch.get().value ?? null
}

async function look(draftKeys: readonly string[]): Promise<Kept> {
  const { core } = opened()
  const { db } = core
  const outbox = await db.outbox.toArray()
  // A row or an op that does not open is no row: these throw then.
  const rows = await db.row.toArray()
  await Promise.all(rows.map((row) => core.cache.row(core.keys, row)))
  await Promise.all(outbox.map((record) => core.cache.op(core.keys.outbox, record)))
  const drafts = await Promise.all(draftKeys.map(async (key) => [key, await readDraft(key)]))
  return {
    outbox: outbox.map(({ dseq, opId, state }) => ({ dseq, opId, state })),
    rows: rows.map(({ key, seq, jobId }) => ({ key, seq, jobId })),
    photos: (await db.photo.toArray()).map(({ hash, state }) => ({ hash, state })),
    photoBytes: (await db.photoBytes.toCollection().primaryKeys()) as string[],
    drafts: Object.fromEntries(drafts),
    stamped: (await readMeta(db, 'stamp'))?.dseq ?? 0,
    cursor: (await readMeta(db, 'cursor'))?.seq ?? 0,
  }
}

const page: KillPage = {
  async open(actor) {
    phone = await Phone.open({
      actor,
      ports,
      step,
      failed: (cause) => {
        throw cause
      },
    })
    if (!(await phone.isEnrolled())) {
      const known = await phone.enrol()
      if (!known.ok) throw new Error(`not enrolled: ${known.problem.kind}`)
    }
    return phone.deviceId
  },
  arm(at) {
    steps = []
    killAt = at
  },
  steps: () => steps,
  draft,
  async record(ops, more) {
    isHeld = true
    const photos = more.photo === null ? [] : [photoOf(more.photo)]
    await opened().record(ops, { photos, clearDrafts: more.clearDrafts })
    await opened().sender.idle()
  },
  async send() {
    isHeld = false
    const { sender, core } = opened()
    await sender.sendNow('tap')
    isHeld = true
    const ops = await core.db.outbox.where('state').anyOf('waiting', 'blocked', 'stuck').count()
    const photos = await core.db.photo.where('state').notEqual('sent').count()
    const { reached, need } = sender.state.get()
    return { ops, photos, reached, need }
  },
  look,
}

function photoOf({ base64, ...photo }: PhotoText): NewPhoto {
  const bytes = Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0)).buffer
  return { ...photo, bytes, thumb: new Uint8Array([1, 2, 3]).buffer }
}

globalThis.killPage = page
