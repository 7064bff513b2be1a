/** What a complaint beside the first says, and when the first one comes. */
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { type Evidence, nothing, type Sight, tableOf } from './evidence-table'
import { tableFactor } from './factor'

/** A further symptom, of 100: faults known to show it, and others (guess). */
const FURTHER_SYMPTOM = { member: 60, otherwise: 20 }

/** The evidence of an entry of a complaint; null where it is the job's own and nothing told of it. */
export function symptomEvidence(
  sight: Sight,
  entry: LogEntry,
  { symptom, conditions }: Extract<LogBody, { kind: 'symptom' }>,
): Evidence | null {
  if (symptom === sight.c.symptom) return conditionEvidence(sight, entry, conditions)
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

/**
 * When the complaint comes, as it was told: P(all of this is said | fault), the conditions taken as said one by one
 * without regard to each other. Conditions that were not named say nothing.
 */
function conditionEvidence(
  sight: Sight,
  entry: LogEntry,
  said: readonly string[],
): Evidence | null {
  const known = sight.c.index.symptoms.get(sight.c.symptom ?? '')?.conditions ?? []
  const told = known.flatMap(({ id, name, tells }) =>
    said.includes(id) && tells !== null ? [{ name, ...tells }] : [],
  )
  if (told.length === 0) return null
  const faults = new Set(told.flatMap(({ of100 }) => Object.keys(of100)))
  const row = (fault: string): [number, number] => {
    const p = told.reduce((all, t) => all * ((t.of100[fault] ?? t.otherwise) / 100), 1)
    return [100 * (1 - p), 100 * p]
  }
  const table = Object.fromEntries([...faults].map((fault) => [fault, row(fault)]))
  const factor = tableFactor(tableOf(sight.place, { table, otherwise: row('') }), [0, 1])
  const label = `Said of it: ${told.map(({ name }) => name.toLowerCase()).join(', ')}`
  return { ...nothing(entry, 'symptom', label), factor }
}
