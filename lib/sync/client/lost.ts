import { liveCell } from './live'
import { type PhoneDb, readMeta, writeMeta } from './phone-db'
import type { Watch } from './watch'

/** Records that went with the store before this one, and the day of the last of them, `YYYY-MM-DD` (P22). */
export type Lost = { ops: number; lastOn: string | null }

/** What was lost, until its person has read it; null when nothing was. */
export async function lostOf(db: PhoneDb): Promise<Lost | null> {
  const held = await readMeta(db, 'lost')
  return held === undefined || held.told ? null : { ops: held.ops, lastOn: held.lastOn }
}

/** Its person has read it: it is not told again. */
export async function lostIsRead(db: PhoneDb): Promise<void> {
  const held = await readMeta(db, 'lost')
  if (held !== undefined) await writeMeta(db, 'lost', { ...held, told: true })
}

/** As lostOf, for a screen. */
export const watchLost = (db: PhoneDb, failed: (cause: unknown) => void): Watch<Lost | null> =>
  liveCell<Lost | null, Lost | null>({
    initial: null,
    read: () => lostOf(db),
    open: (lost) => lost,
    failed,
    life: db.life,
  })

/** Other phones of this person that told of unsent work when they were last heard (P22). */
export type SilentPhones = { phones: number; ops: number; photos: number; lastAt: string }

/** Phones that fell silent, until their person has read it; null when none did. */
export async function silentOf(db: PhoneDb): Promise<SilentPhones | null> {
  const held = await readMeta(db, 'silent')
  if (held === undefined || held.told) return null
  const { told: _, ...silent } = held
  return silent
}

/** Their person has read it: it is not told again. */
export async function silentIsRead(db: PhoneDb): Promise<void> {
  const held = await readMeta(db, 'silent')
  if (held !== undefined) await writeMeta(db, 'silent', { ...held, told: true })
}

/** As silentOf, for a screen. */
export const watchSilent = (
  db: PhoneDb,
  failed: (cause: unknown) => void,
): Watch<SilentPhones | null> =>
  liveCell<SilentPhones | null, SilentPhones | null>({
    initial: null,
    read: () => silentOf(db),
    open: (silent) => silent,
    failed,
    life: db.life,
  })
