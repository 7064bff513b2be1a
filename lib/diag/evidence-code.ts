/**
 * What a trouble code says of the suspects. A code names a circuit, and its kind tells the faults in it apart by
 * their role. A code may also tell of faults beside any circuit: a misfire, a mixture, a temperature. Codes that tell
 * the same story say one thing, as misfires of two cylinders do, so only one of them counts. Numbers marked "guess"
 * have no source.
 */
import type { CodeContext, CodeSeen } from '@/lib/model/code-seen'
import type { LogEntry } from '@/lib/model/log-entry'
import { type CodeMeaning, codeMeaning, roleOf100 } from './code-words'
import { fixesBefore } from './evidence-log'
import { type Evidence, nothing, type Sight, tableAt } from './evidence-table'
import { tableFactor } from './factor'
import type { OutcomeTable } from './outcome-table'

type CodeBody = { seen: CodeSeen; context: CodeContext }

/** How much a code tells a fault of its circuit from others when the kind is silent, of 100 (guess). */
const CIRCUIT_ONLY = { member: 20, otherwise: 10 }
/** How likely a code that is not shown as active is left from another day, before it counts (guess). */
const OLD_CODE = { active: 0, unknown: 0.25, stored: 0.5 }

/**
 * The evidence of a code: P(code | fault) by what the code tells of it, else by its role in the circuit; P(code | none
 * of them) = `otherwise`; noisy-OR with that leak. `isTeller`: it is the one code that counts of its story.
 */
export function codeEvidence(
  sight: Sight,
  entry: LogEntry,
  { body, at, isTeller }: { body: CodeBody; at: number; isTeller: boolean },
): Evidence {
  const meaning = codeMeaning(sight.c.index, body.seen)
  const { title, subject, circuit, tells } = meaning
  const label = subject === null ? title : `${title}: ${subject}`
  if (circuit === null && tells === null) return nothing(entry, 'code', label)
  if (tells !== null && !isTeller)
    return nothing(entry, 'code', `${label} (another code tells the same)`)
  const table = codeTable(sight, meaning)
  const now = body.context.status === 'active' ? tableAt(sight, table, at) : table
  const factor = tableFactor(now, [OLD_CODE[body.context.status], 1])
  return { ...nothing(entry, 'code', label), factor }
}

function codeTable({ c, place }: Sight, { circuit, failure, tells }: CodeMeaning): OutcomeTable {
  const rows = new Map<number, readonly number[]>()
  for (const { id, circuits } of c.index.faults.values()) {
    const at = place.get(id)
    const seat = circuits.find((s) => s.circuit === circuit)
    const told = tells?.of100[id]
    if (at === undefined || (seat === undefined && told === undefined)) continue
    const byRole = seat === undefined || failure === null ? null : roleOf100(failure, seat.role)
    rows.set(at, chancesOf(told ?? byRole ?? CIRCUIT_ONLY.member))
  }
  const known = failure !== null && failure.byRole !== null
  const leak = tells?.otherwise ?? (known ? failure.otherwise : CIRCUIT_ONLY.otherwise)
  return { rows, otherwise: chancesOf(leak) }
}

/** Not set and set, never under 1 of 10,000 nor so near to 1 (guess): one code may rule nothing out for good. */
function chancesOf(of100: number): readonly [number, number] {
  const set = Math.min(99.99, Math.max(0.01, of100)) / 100
  return [1 - set, set]
}

/**
 * The places of the codes that count for their stories, among the places of those that stand: of each story, and anew
 * after a fix of what it tells of, the one that is the least likely left from another day, then the first.
 */
export function tellersOf(sight: Sight, standing: readonly number[]): ReadonlySet<number> {
  const best = new Map<string, { at: number; old: number }>()
  for (const at of standing) {
    const body = sight.c.entries[at]?.body
    if (body?.kind !== 'code') continue
    const { tells } = codeMeaning(sight.c.index, body.seen)
    if (tells === null) continue
    const story = `${codeRound(sight, body, at)} ${tells.id}`
    const old = OLD_CODE[body.context.status]
    if (old < (best.get(story)?.old ?? Number.POSITIVE_INFINITY)) best.set(story, { at, old })
  }
  return new Set([...best.values()].map(({ at }) => at))
}

/** How often what a code speaks of was fixed before: an active code after a fix is another one. */
export const codeRound = (sight: Sight, body: CodeBody, at: number): number =>
  body.context.status === 'active' ? fixesSpokenOf(sight, body.seen, at) : 0

/** Whether an entry is a code that is not active, after a fix of something that it speaks of. */
export function isOldCode(sight: Sight, at: number): boolean {
  const body = sight.c.entries[at]?.body
  return (
    body?.kind === 'code' &&
    body.context.status !== 'active' &&
    fixesSpokenOf(sight, body.seen, at) > 0
  )
}

/** How many fixes of faults in a code's circuit, or that it tells of, came before a place in the log. */
function fixesSpokenOf({ c, log }: Sight, seen: CodeSeen, at: number): number {
  if (log.fixes.size === 0) return 0
  const { circuit, tells } = codeMeaning(c.index, seen)
  let count = 0
  for (const { id, circuits } of c.index.faults.values())
    if (circuits.some((s) => s.circuit === circuit) || tells?.of100[id] !== undefined)
      count += fixesBefore(log, id, at)
  return count
}
