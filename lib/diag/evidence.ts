/**
 * The job log as pieces of evidence, in the order of the log. The complaint is the condition of the belief
 * and no evidence (rule R5). The same check, code or symptom again is not new evidence: the latest replaces.
 * `couldNot`, notes, photos, fixes and ways out move nothing. Numbers marked "guess" have no source.
 */
import type { CodeContext, CodeSeen } from '@/lib/model/code-seen'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import type { Case } from './case'
import { codeMeaning, roleOf100 } from './code-words'
import { isShedByTwin, readingEvidence } from './evidence-reading'
import { runEvidence } from './evidence-run'
import { swapEvidence } from './evidence-swap'
import { type Evidence, nothing, type Sight, sightOf, tableOf } from './evidence-table'
import { saysNothing, tableFactor } from './factor'
import type { Candidate } from './priors'

/** How much a code tells a fault of its circuit from others when the kind is silent, of 100 (guess). */
const CIRCUIT_ONLY = { member: 20, otherwise: 10 }
/** How likely a code that is not shown as active is left from another day, before it counts (guess). */
const OLD_CODE = { active: 0, unknown: 0.25, stored: 0.5 }
/** A further symptom, of 100: faults known to show it, and others (guess). */
const FURTHER_SYMPTOM = { member: 60, otherwise: 20 }

/** The evidence of a case, oldest first. Same input, same list: nothing depends on the order entries came in. */
export function evidenceOf(c: Case, suspects: readonly Candidate[]): Evidence[] {
  const sight = sightOf(c, suspects)
  const latest = latestByKey(c.entries)
  const list: Evidence[] = []
  c.entries.forEach((entry, at) => {
    const key = keyOf(entry.body)
    const replaced = key !== null && latest.get(key) !== entry.id
    const piece = replaced ? replacedBy(entry) : pieceOf(sight, entry, at)
    if (piece !== null) list.push(quiet(piece))
  })
  return list
}

function pieceOf(sight: Sight, entry: LogEntry, at: number): Evidence | null {
  const { body } = entry
  switch (body.kind) {
    case 'symptom':
      return symptomEvidence(sight, entry, body.symptom)
    case 'code':
      return codeEvidence(sight, entry, body)
    case 'check':
      return checkEvidence(sight, entry, body)
    case 'couldNot':
      return nothing(entry, 'check', `${checkName(sight, body.checkId)}: could not be done`)
    case 'reading':
      return readingEvidence(sight, entry, body)
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

function symptomEvidence(sight: Sight, entry: LogEntry, symptom: string): Evidence | null {
  if (symptom === sight.c.symptom) return null
  const name = sight.c.index.symptoms.get(symptom)?.name ?? symptom
  const table: Record<string, number[]> = {}
  for (const fault of sight.c.index.faults.values()) {
    if (!fault.shares.some((s) => s.symptom === symptom)) continue
    table[fault.id] = [100 - FURTHER_SYMPTOM.member, FURTHER_SYMPTOM.member]
  }
  const otherwise = [100 - FURTHER_SYMPTOM.otherwise, FURTHER_SYMPTOM.otherwise]
  const factor = tableFactor(tableOf(sight.place, { table, otherwise }), [0, 1])
  return { ...nothing(entry, 'symptom', `Also: ${name}`), factor }
}

/** P(code | fault) by its role in the circuit; P(code | none of them) = `otherwise`; noisy-OR with that leak. */
function codeEvidence(
  { c, place }: Sight,
  entry: LogEntry,
  body: { seen: CodeSeen; context: CodeContext },
): Evidence {
  const { title, circuit, failure, subject } = codeMeaning(c.index, body.seen)
  const label = subject === null ? title : `${title}: ${subject}`
  if (circuit === null) return nothing(entry, 'code', label)
  const rows = new Map<number, readonly number[]>()
  for (const fault of c.index.faults.values()) {
    const at = place.get(fault.id)
    const seat = fault.circuits.find((s) => s.circuit === circuit)
    if (at === undefined || seat === undefined) continue
    const of100 = (failure === null ? null : roleOf100(failure, seat.role)) ?? CIRCUIT_ONLY.member
    rows.set(at, [1 - of100 / 100, of100 / 100])
  }
  const known = failure !== null && failure.byRole !== null
  const leak = Math.max(0.01, known ? failure.otherwise : CIRCUIT_ONLY.otherwise) / 100
  const old = OLD_CODE[body.context.status]
  const factor = tableFactor({ rows, otherwise: [1 - leak, leak] }, [old, 1])
  return { ...nothing(entry, 'code', label), factor }
}

function checkEvidence(
  sight: Sight,
  entry: LogEntry,
  body: Extract<LogBody, { kind: 'check' }>,
): Evidence {
  const check = sight.c.index.checks.get(body.checkId)
  const label = checkName(sight, body.checkId)
  if (check === undefined) return nothing(entry, 'check', label)
  const at = outcomeAt(check.outcomes, body.outcome)
  if (at === null) return nothing(entry, 'check', `${label}: ${body.outcome}`)
  const said = `${label}: ${check.outcomes[at]?.name ?? body.outcome}`
  const silenced = silencedBy(sight, body.checkId)
  if (silenced !== null) return nothing(entry, 'check', `${said} (${silenced})`)
  const weights = check.outcomes.map((_, k) => (k === at ? 1 : 0))
  const factor = tableFactor(tableOf(sight.place, check), weights)
  return { ...nothing(entry, 'check', said), factor }
}

/**
 * Why the outcome pressed by hand does not count beside the check's newest reading; null when it does, as the
 * reading alone moves nothing (no limits and no figure to hold it against).
 */
function silencedBy(sight: Sight, checkId: string): string | null {
  const entry = sight.c.entries.findLast(
    ({ body }) => body.kind === 'reading' && body.checkId === checkId && body.subject === 'suspect',
  )
  if (entry?.body.kind !== 'reading') return null
  if (isShedByTwin(sight.c, entry.body)) return 'a good one reads the same, so it says nothing'
  const { factor } = readingEvidence(sight, entry, entry.body)
  return factor === null ? null : 'counted by its reading'
}

/** Where an outcome stands: by its own id, else `good` is the first and `bad` the last; null for any other. */
export function outcomeAt(outcomes: readonly { id: string }[], outcome: string): number | null {
  const at = outcomes.findIndex((o) => o.id === outcome)
  if (at >= 0) return at
  if (outcome === 'good') return 0
  return outcome === 'bad' ? outcomes.length - 1 : null
}

const checkName = ({ c }: Sight, id: string): string => c.index.checks.get(id)?.name ?? id

function keyOf(body: LogBody): string | null {
  switch (body.kind) {
    // A later "could not" takes nothing back: it says nothing, so it has no key.
    case 'check':
      return `check ${body.checkId}`
    case 'reading':
      return `reading ${body.subject} ${body.checkId}`
    case 'code':
      return `code ${body.context.module} ${JSON.stringify(body.seen)}`
    case 'symptom':
      return `symptom ${body.symptom}`
    default:
      return null
  }
}

function latestByKey(entries: readonly LogEntry[]): Map<string, string> {
  const latest = new Map<string, string>()
  for (const entry of entries) {
    const key = keyOf(entry.body)
    if (key !== null) latest.set(key, entry.id)
  }
  return latest
}

function replacedBy(entry: LogEntry): Evidence | null {
  const { kind } = entry.body
  if (kind === 'symptom') return null
  const about = kind === 'code' ? 'code' : kind === 'reading' ? 'reading' : 'check'
  return nothing(entry, about, 'Replaced by a later one')
}

function quiet(piece: Evidence): Evidence {
  return piece.factor !== null && saysNothing(piece.factor) ? { ...piece, factor: null } : piece
}
