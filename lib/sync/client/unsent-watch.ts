import type { Core } from './core'
import { liveCell } from './live'
import { type OutboxRecord, type PhotoRecord, readMeta } from './phone-db'
import type { SendState } from './phone-sender'
import type { Room } from './room'
import { NOTHING_UNSENT, opItem, photoItem, summed } from './unsent'
import type { UnsentItem, UnsentView } from './views'
import { LiveCell, type Watch } from './watch'

type Kept = {
  records: OutboxRecord[]
  photos: PhotoRecord[]
  fetchedAt: string | null
  setAside: number
}
type Listed = { items: { record: OutboxRecord; item: UnsentItem }[]; kept: Kept } | null

/** Everything about unsent work, from the store and from what the sender and the browser say (P23). */
export function watchUnsent(of: {
  core: Core
  state: Watch<SendState>
  room: Watch<Room>
  draftsKept: Watch<boolean>
  online: () => boolean
  failed: (cause: unknown) => void
}): Watch<UnsentView> {
  const { core } = of
  const listed = liveCell<Kept, Listed>({
    initial: null,
    read: () => readKept(core),
    open: async (kept) => ({ items: await listOps(core, kept.records), kept }),
    failed: of.failed,
  })
  const view = (now: NonNullable<Listed>): UnsentView => {
    const state = of.state.get()
    const base = {
      ...NOTHING_UNSENT,
      counted: true,
      ...of.room.get(),
      sending: state.running,
      online: state.reached ?? of.online(),
      needs: state.need,
      draftsKept: of.draftsKept.get(),
    }
    const sending = state.running !== null
    const ops = now.items.map(({ record, item }) => ({
      ...item,
      state: sending && record.state === 'waiting' ? ('sending' as const) : item.state,
    }))
    const photos = now.kept.photos.map((photo) => photoItem(photo, sending && ops.length === 0))
    const { fetchedAt, setAside } = now.kept
    return { ...base, ...summed([...ops, ...photos]), fetchedAt, setAside }
  }
  return new LiveCell(NOTHING_UNSENT, (emit) => {
    let isFresh = false
    const tell = () => {
      const now = listed.get()
      if (isFresh && now !== null) emit(view(now))
    }
    const ends = [of.state, of.room, of.draftsKept].map((watch) => watch.subscribe(tell))
    const end = listed.subscribe(() => {
      isFresh = true
      tell()
    })
    return () => {
      for (const leave of [...ends, end]) leave()
    }
  })
}

async function readKept(core: Core): Promise<Kept> {
  const { db } = core
  const records = await db.outbox.where('state').anyOf('waiting', 'blocked', 'stuck').sortBy('dseq')
  const photos = await db.photo.where('state').anyOf('waiting', 'stuck').sortBy('since')
  const fetchedAt = (await readMeta(db, 'fetchedAt')) ?? null
  return { records, photos, fetchedAt, setAside: ((await readMeta(db, 'setAside')) ?? []).length }
}

const listOps = (core: Core, records: OutboxRecord[]) =>
  Promise.all(
    records.map(async (record) => ({
      record,
      item: opItem(record, await core.cache.op(core.keys.outbox, record), false),
    })),
  )
