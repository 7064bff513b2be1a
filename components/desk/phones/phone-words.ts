import { entryWords } from '@/components/log/entry-words'
import type { LogShape } from '@/components/ui/log-icon'
import type { BookIndex } from '@/lib/diag/book-index'
import type { DeskPhone, Quarantined } from '@/lib/model/phones'
import { opTitle, refusalWords } from '@/lib/sync/client/unsent'
import { span } from '../../field/times'
import { whenWords } from '../../field/when-words'
import { counted } from '../../field/words'
import { actedSentence } from '../desk-sentences'
import type { Decided, PhoneProblem } from './phone-actions'

/** The sentence for a refused or failed press. */
export function phoneSentence(problem: PhoneProblem | { kind: 'trouble' }): string {
  switch (problem.kind) {
    case 'decidedBefore':
      return 'That was decided before, and the word stands. The list is read again.'
    case 'busy':
      return 'The shop is busy. Some of it may be done; look at the list, then press again.'
    default:
      return actedSentence(problem)
  }
}

/** Whose phone it is, as the shop may still say it. */
export const ownerOf = ({ person }: DeskPhone): string => person.name ?? 'Name erased'

/**
 * What each phone is called at the desk, by id: its person's name, and with a number in the order they came
 * into use where the person has several, so that no two read alike.
 */
export function phoneTitles(phones: readonly DeskPhone[]): Map<string, string> {
  const inOrder = [...phones].sort((a, b) =>
    `${a.enrolledAt} ${a.id}` < `${b.enrolledAt} ${b.id}` ? -1 : 1,
  )
  return new Map(
    phones.map((phone) => {
      const name = ownerOf(phone)
      const own = inOrder.filter((one) => one.person.id === phone.person.id)
      return [phone.id, own.length === 1 ? name : `${name}, phone ${own.indexOf(phone) + 1}`]
    }),
  )
}

/** A clock less than this off is right enough to say so (a choice; stamps are judged from 60 s on). */
const CLOCK_RIGHT_MS = 30_000

/** "Right", "12 min ahead", "3 days behind". */
export function clockWords(offsetMs: number | null): string {
  if (offsetMs === null) return 'Not known'
  if (Math.abs(offsetMs) < CLOCK_RIGHT_MS) return 'Right'
  const off = Math.abs(offsetMs)
  const long = off < 60_000 ? `${Math.round(off / 1000)} s` : span(off)
  return `${long} ${offsetMs > 0 ? 'ahead' : 'behind'}`
}

type Times = { zone: string; now: number | null }

/** "Nothing", "5 records and 2 files, oldest 24 Nov 08:10", and since when nobody knows. */
export function heldWords(phone: DeskPhone, { zone, now }: Times): string[] {
  const { held } = phone
  if (held === null) return ['It never told.']
  const parts = [
    held.ops > 0 ? counted(held.ops, 'record') : '',
    held.photos > 0 ? counted(held.photos, 'photo or voice note', 'photos or voice notes') : '',
  ].filter((part) => part !== '')
  const what = parts.length === 0 ? 'Nothing' : parts.join(' and ')
  const oldest =
    parts.length > 0 && held.oldestAt !== null
      ? `, oldest from ${whenWords(held.oldestAt, zone, now)}`
      : ''
  const after = `After ${whenWords(held.toldAt, zone, now)}: unknown how many.`
  return [`${what}${oldest}.`, phone.wipeToldAt === null ? after : 'All of it was handed over.']
}

/** "24 Nov 09:40, 9 h 05 ago". */
export function reachedWords(at: string | null, { zone, now }: Times): string {
  if (at === null) return 'Never'
  const ago = now === null ? '' : `, ${span(now - Date.parse(at))} ago`
  return `${whenWords(at, zone, now)}${ago}`
}

/** What went with a store that is gone from its phone. */
export function goneWords(gone: NonNullable<DeskPhone['gone']>): string {
  const last = gone.lastOn === null ? '' : `, last kept on ${gone.lastOn}`
  if (gone.deletedOps > 0) {
    return `Emptied by its person, who deleted ${counted(gone.deletedOps, 'unsent record')}${last}.`
  }
  if (gone.lostOps > 0)
    return `Cleared by its browser: ${counted(gone.lostOps, 'record')} lost${last}.`
  return 'Cleared by its browser; the shop had all of it.'
}

/** A line of the quarantine: shape, what it is, and what is in it. */
export function itemWords(
  item: Quarantined,
  book: BookIndex | null,
): { shape: LogShape; title: string; lines: string[] } {
  if (item.entry !== null) {
    const { shape, kind, title, lines } = entryWords(item.entry.body, book)
    return { shape, title: kind === title ? title : `${kind}: ${title}`, lines }
  }
  const title = KINDS[item.kind] ?? opTitle(item.kind) ?? 'Something this desk does not know'
  return { shape: item.kind === 'file' ? 'frame' : 'ring', title, lines: [] }
}

const KINDS: Readonly<Record<string, string>> = {
  file: 'Photo or voice note of an entry that is in the log',
  refused: 'A record that cannot be read',
  later: 'A record of a newer version of the app',
}

/** Why an item was left where it is, in one sentence. */
export function leftWords({ code, detail }: Pick<Decided, 'code' | 'detail'>): string {
  if (code === 'waits') return 'Waits for another record: accept that one first.'
  if (code === 'later') return 'This server is older than the app that made it. Try again later.'
  if (code === 'stale_status')
    return `${refusalWords(code)}${detail ? ` It stands at: ${detail}.` : ''}`
  if (code === 'forbidden') return 'The roles of its person did not allow this.'
  return refusalWords(code ?? null)
}
