/**
 * The job log as pieces of evidence, in the order of the log. The complaint is the condition of the belief
 * and no evidence (rule R5). The same check, code or symptom again is not new evidence: the latest replaces.
 * `couldNot`, notes, photos, fixes and ways out move nothing. Numbers marked "guess" have no source.
 */
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import type { Case } from './case'
import { codeEvidence, codeRound, isOldCode, tellersOf } from './evidence-code'
import { fixesBefore } from './evidence-log'
import { isShedByTwin, readingEvidence } from './evidence-reading'
import { runEvidence } from './evidence-run'
import { swapEvidence } from './evidence-swap'
import { symptomEvidence } from './evidence-symptom'
import {
  type Evidence,
  leftOut,
  nothing,
  type Sight,
  sightOf,
  tableAt,
  tableOf,
} from './evidence-table'
import { saysNothing, tableFactor } from './factor'
import type { Candidate } from './priors'

type CheckBody = Extract<LogBody, { kind: 'check' }>

/** Pieces that may speak in one job: more than anybody takes down, and a bound on what is reckoned. */
export const MOST_PIECES = 60

/** The evidence of a case, oldest first. Same input, same list: nothing depends on the order entries came in. */
export function evidenceOf(c: Case, suspects: readonly Candidate[]): Evidence[] {
  const sight = sightOf(c, suspects)
  const keys = c.entries.map(({ body }, at) => keyOf(sight, body, at))
  const latest: Latest = new Map()
  const leftOver = new Set<number>()
  keys.forEach((key, at) => {
    if (key === null) return
    if (latest.has(key) && isOldCode(sight, at)) leftOver.add(at)
    else latest.set(key, at)
  })
  const tellers = tellersOf(
    sight,
    keys.flatMap((key, at) => (key !== null && latest.get(key) === at ? [at] : [])),
  )
  const speaking = new Set<string>()
  const list: Evidence[] = []
  c.entries.forEach((entry, at) => {
    const key = keys[at] ?? null
    const isLast = key === null || latest.get(key) === at
    const piece = leftOver.has(at)
      ? nothing(entry, 'code', 'Stored, and seen before the fix')
      : isLast
        ? pieceOf({ sight, latest, tellers }, entry, at)
        : replacedBy(entry)
    if (piece !== null) list.push(counted(quiet(piece), speaking))
  })
  return list
}

function counted(piece: Evidence, speaking: Set<string>): Evidence {
  if (piece.factor === null || speaking.has(piece.slot)) return piece
  if (speaking.size < MOST_PIECES) {
    speaking.add(piece.slot)
    return piece
  }
  return leftOut(piece, `${MOST_PIECES} pieces of evidence are the most`)
}

/** The place of the newest entry by its key, see `keyOf`. */
type Latest = Map<string, number>
type Seen = { sight: Sight; latest: Latest }

function pieceOf(
  { sight, latest, tellers }: Seen & { tellers: ReadonlySet<number> },
  entry: LogEntry,
  at: number,
): Evidence | null {
  const { body } = entry
  switch (body.kind) {
    case 'symptom':
      return symptomEvidence(sight, entry, body)
    case 'code':
      return codeEvidence(sight, entry, { body, at, isTeller: tellers.has(at) })
    case 'check':
      return checkEvidence({ sight, latest }, entry, { body, at })
    case 'couldNot':
      return nothing(entry, 'check', `${checkName(sight, body.checkId)}: could not be done`)
    case 'reading':
      return readingEvidence(sight, entry, { body, at })
    case 'swap':
      return swapEvidence(sight, entry, body)
    case 'fix':
      return nothing(
        entry,
        'repair',
        `Fixed: ${sight.c.index.faults.get(body.fault)?.name ?? body.fault}`,
      )
    case 'proofRun':
      return runEvidence(sight, entry, { body, at })
    default:
      return null
  }
}

function checkEvidence(
  { sight, latest }: Seen,
  entry: LogEntry,
  { body, at }: { body: CheckBody; at: number },
): Evidence {
  const check = sight.c.index.checks.get(body.checkId)
  const label = checkName(sight, body.checkId)
  if (check === undefined) return nothing(entry, 'check', label)
  const seen = outcomeAt(check.outcomes, body.outcome)
  if (seen === null) return nothing(entry, 'check', `${label}: ${body.outcome}`)
  const said = `${label}: ${check.outcomes[seen]?.name ?? body.outcome}`
  const silenced = silencedBy({ sight, latest }, body.checkId, at)
  if (silenced !== null) return nothing(entry, 'check', `${said} (${silenced})`)
  const weights = check.outcomes.map((_, k) => (k === seen ? 1 : 0))
  const table = tableAt(sight, tableOf(sight.place, check), at)
  return { ...nothing(entry, 'check', said), factor: tableFactor(table, weights) }
}

/**
 * Why the outcome pressed by hand does not count beside the check's newest reading of the same part; null when it
 * does, as the reading alone moves nothing (no limits and no figure to hold it against).
 */
function silencedBy({ sight, latest }: Seen, checkId: string, at: number): string | null {
  const readAt = latest.get(readingKey(sight, { subject: 'suspect', checkId }, at))
  const entry = readAt === undefined ? undefined : sight.c.entries[readAt]
  if (readAt === undefined || entry?.body.kind !== 'reading') return null
  if (isShedByTwin(sight, entry.body)) return 'a good one reads the same, so it says nothing'
  const { factor } = readingEvidence(sight, entry, { body: entry.body, at: readAt })
  return factor === null ? null : 'counted by its reading'
}

/** How many fixes of faults that a check can tell about came before a place in the log. */
function fixesTouching({ c, log }: Sight, checkId: string, at: number): number {
  if (log.fixes.size === 0) return 0
  const check = c.index.checks.get(checkId)
  const faults = new Set([
    ...Object.keys(check?.table ?? {}),
    ...Object.keys(check?.reading?.byFault ?? {}),
  ])
  return [...faults].reduce((count, fault) => count + fixesBefore(log, fault, at), 0)
}

/** The entries whose place a check would take if it were done again now. */
export function standingFor(sight: Sight, checkId: string): string[] {
  const { entries } = sight.c
  const round = fixesTouching(sight, checkId, entries.length)
  return entries.flatMap(({ id, body }, at) => {
    const isOfCheck =
      body.kind === 'check' || (body.kind === 'reading' && body.subject === 'suspect')
    const isStanding =
      isOfCheck && body.checkId === checkId && fixesTouching(sight, checkId, at) === round
    return isStanding ? [id] : []
  })
}

/** Where an outcome stands: by its own id, else `good` is the first and `bad` the last; null for any other. */
export function outcomeAt(outcomes: readonly { id: string }[], outcome: string): number | null {
  const at = outcomes.findIndex((o) => o.id === outcome)
  if (at >= 0) return at
  if (outcome === 'good') return 0
  return outcome === 'bad' ? outcomes.length - 1 : null
}

const checkName = ({ c }: Sight, id: string): string => c.index.checks.get(id)?.name ?? id

/**
 * What a later entry replaces. A check or reading taken again after a fix of what it looks at is another one: the
 * first spoke of the old part. So is an active code; one that is only stored may be left from before the fix.
 */
function keyOf(sight: Sight, body: LogBody, at: number): string | null {
  switch (body.kind) {
    // A later "could not" takes nothing back: it says nothing, so it has no key.
    case 'check':
      return `check ${fixesTouching(sight, body.checkId, at)} ${body.checkId}`
    case 'reading':
      return readingKey(sight, body, at)
    case 'code':
      return `code ${codeRound(sight, body, at)} ${body.context.module} ${JSON.stringify(body.seen)}`
    case 'symptom':
      return `symptom ${body.symptom}`
    default:
      return null
  }
}

const readingKey = (
  sight: Sight,
  { subject, checkId }: { subject: string; checkId: string },
  at: number,
): string => `reading ${subject} ${fixesTouching(sight, checkId, at)} ${checkId}`

function replacedBy(entry: LogEntry): Evidence | null {
  const { kind } = entry.body
  if (kind === 'symptom') return null
  const about = kind === 'code' ? 'code' : kind === 'reading' ? 'reading' : 'check'
  return nothing(entry, about, 'Replaced by a later one')
}

/** A piece that is the same under every set says nothing; a step of a swap still stands in the last one's place. */
function quiet(piece: Evidence): Evidence {
  const isOwn = piece.slot === piece.entryId
  return isOwn && piece.factor !== null && saysNothing(piece.factor)
    ? { ...piece, factor: null }
    : piece
}
