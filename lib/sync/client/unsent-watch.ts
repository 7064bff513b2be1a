import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { Op } from '@/lib/sync/protocol/op'
import type { Core } from './core'
import { type Line, stalledOf } from './health'
import { liveCell } from './live'
import { recordsIn } from './outbox'
import { type OutboxRecord, type PhotoRecord, readMeta } from './phone-db'
import type { SendState } from './phone-sender'
import type { Room } from './room'
import { NOTHING_UNSENT, opItem, photoItem, summed, withWaits } from './unsent'
import type { UnsentItem, UnsentView } from './views'
import { LiveCell, type Watch } from './watch'

type Kept = {
  records: OutboxRecord[]
  photos: PhotoRecord[]
  fetchedAt: string | null
  setAside: number
  letGoCount: number
  filesLetGo: number
}
type Listed = { ops: { record: OutboxRecord; op: Op }[]; items: UnsentItem[]; kept: Kept } | null

/** How often it is looked whether anything has moved (a choice). */
const LOOK_EVERY_MS = 30_000

/** Everything about unsent work, from the store and from what the sender and the browser say (P23, P24). */
export function watchUnsent(of: {
  core: Core
  state: Watch<SendState>
  room: Watch<Room>
  draftsKept: Watch<boolean>
  ports: Pick<SyncPorts, 'clock' | 'timer' | 'network'>
  /** The phone's clock as the records were stamped by it. */
  now: () => number
  failed: (cause: unknown) => void
}): Watch<UnsentView> {
  const { core } = of
  const pulse = new Pulse(of)
  const listed = liveCell<Kept, Listed>({
    initial: null,
    read: () => readKept(core),
    open: async (kept) => await listOps(core, kept),
    failed: of.failed,
    life: core.db.life,
  })
  const view = (now: NonNullable<Listed>): UnsentView => {
    const state = of.state.get()
    const sending = state.running !== null
    const ops = now.items.map((item) => ({
      ...item,
      state: sending && item.state === 'waiting' ? ('sending' as const) : item.state,
    }))
    const photos = now.kept.photos.map((photo) => photoItem(photo, sending && ops.length === 0))
    const { fetchedAt, setAside, letGoCount, filesLetGo } = now.kept
    const items = [...ops, ...photos]
    return {
      ...NOTHING_UNSENT,
      counted: true,
      ...of.room.get(),
      sending: state.running,
      online: state.reached ?? of.ports.network.online(),
      stalled: stalledOf(items, state, pulse.line()),
      needs: state.need,
      draftsKept: of.draftsKept.get(),
      ...summed(items),
      fetchedAt,
      setAside,
      letGoCount,
      filesLetGo,
    }
  }
  return new LiveCell(NOTHING_UNSENT, (emit) => {
    let isFresh = false
    const tell = () => {
      const now = listed.get()
      if (isFresh && now !== null) emit(view(now))
    }
    const ends = [of.state, of.room, of.draftsKept].map((watch) => watch.subscribe(tell))
    ends.push(pulse.every(LOOK_EVERY_MS, tell))
    const end = listed.subscribe(() => {
      isFresh = true
      tell()
    })
    return () => {
      for (const leave of [...ends, end]) leave()
    }
  })
}

/** When signal came and when something last moved, as far as this page has seen. */
class Pulse {
  readonly #of: Parameters<typeof watchUnsent>[0]
  #signal: boolean
  #signalSinceMs: number
  #movedMs = 0
  #done = 0

  constructor(of: Parameters<typeof watchUnsent>[0]) {
    this.#of = of
    this.#signal = of.ports.network.online()
    this.#signalSinceMs = of.now()
    of.state.subscribe(() => this.#look())
  }

  line(): Line {
    this.#look()
    return {
      signal: this.#signal,
      signalSinceMs: this.#signalSinceMs,
      movedMs: this.#movedMs,
      nowMs: this.#of.now(),
    }
  }

  #look(): void {
    const signal = this.#of.ports.network.online()
    if (signal && !this.#signal) this.#signalSinceMs = this.#of.now()
    this.#signal = signal
    const done = this.#of.state.get().running?.done ?? 0
    if (done > this.#done) this.#movedMs = this.#of.now()
    this.#done = done
  }

  /** Calls `look` now and again until it is called off. */
  every(ms: number, look: () => void): () => void {
    let callOff: () => void = () => undefined
    const again = () => {
      callOff = this.#of.ports.timer.after(ms, () => {
        look()
        again()
      })
    }
    again()
    return () => callOff()
  }
}

async function readKept(core: Core): Promise<Kept> {
  const { db } = core
  const records = await recordsIn(db, 'waiting', 'blocked', 'stuck')
  const photos = await db.photo.where('state').anyOf('waiting', 'stuck').sortBy('since')
  const fetchedAt = (await readMeta(db, 'fetchedAt')) ?? null
  const setAside = ((await readMeta(db, 'setAside')) ?? []).length
  const filesLetGo = (await readMeta(db, 'filesLetGo')) ?? 0
  const letGoCount = await db.letGo.count()
  return { records, photos, fetchedAt, setAside, letGoCount, filesLetGo }
}

async function listOps(core: Core, kept: Kept): Promise<NonNullable<Listed>> {
  const ops = await Promise.all(
    kept.records.map(async (record) => ({
      record,
      op: await core.cache.op(core.keys.outbox, record),
    })),
  )
  const items = withWaits(
    ops.map(({ record, op }) => opItem(record, op, false)),
    ops,
  )
  return { ops, items, kept }
}
