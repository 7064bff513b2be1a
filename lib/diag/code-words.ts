/**
 * A trouble code in plain words. The code names a circuit and a kind of failure, never a part. A kind
 * supports a fault when at least as many of 100 faults in its role set it as the circuit's faults do on
 * average (no fault of the circuit weighed above another), and argues against it below half of that.
 */
import type { FailureItem } from '@/lib/model/code-book'
import type { CodeSeen } from '@/lib/model/code-seen'
import type { CircuitRole } from '@/lib/model/code-table'
import type { Features } from '@/lib/model/features'
import { assertNever } from '@/lib/model/result'
import { type BookIndex, failureOf, wordName } from './book-index'
import { letsThrough } from './gate'

/** A fault as a code speaks of it: `of100` such faults in its role set this kind; null when the book is silent. */
export type FaultRef = { fault: string; name: string; role: CircuitRole; of100: number | null }

/** What a code says. `unknown` is true when the book knows neither the number nor the failure kind. */
export type CodeWords = {
  title: string
  circuit: { id: string; name: string } | null
  circuitName: string
  failure: { id: string; name: string } | null
  firstThought: string | null
  supportsWords: string | null
  arguesAgainstWords: string | null
  kindSupports: FaultRef[]
  kindArguesAgainst: FaultRef[]
  doesNotProve: string
  makersDiffer: boolean
  unknown: boolean
  source: string
}

/** What a code means by itself: its subject, circuit and kind of failure, as far as the book knows them. */
export type CodeMeaning = {
  title: string
  subject: string | null
  circuit: string | null
  failure: FailureItem | null
  makersDiffer: boolean
  sources: string[]
}

/** The code as a heading, just as the dash showed it: `SPN 1268 FMI 3`, `P0351`, `Flash code 2-4`. */
export function codeAsShown(seen: CodeSeen): string {
  switch (seen.format) {
    case 'spn':
      return `SPN ${seen.spn} FMI ${seen.fmi}`
    case 'pcode':
      return seen.code
    case 'flash':
      return `Flash code ${seen.pattern}`
    case 'asShown':
      return seen.text
    default:
      return assertNever(seen)
  }
}

/** The subject, circuit and failure kind of a code as seen. Nothing is guessed: an unknown number stays unknown. */
export function codeMeaning(index: BookIndex, seen: CodeSeen): CodeMeaning {
  switch (seen.format) {
    case 'spn': {
      const item = index.spns.get(seen.spn)
      const failure = index.failuresByFmi.get(seen.fmi) ?? null
      return {
        title: codeAsShown(seen),
        subject: item?.name ?? null,
        circuit: item?.circuit ?? null,
        failure,
        makersDiffer: item?.makersDiffer ?? true,
        sources: [item?.source, failure?.source].filter((s) => s !== undefined),
      }
    }
    case 'pcode': {
      const item = index.pcodes.get(seen.code)
      const failure = item === undefined ? null : failureOf(index, item.failure)
      return {
        title: codeAsShown(seen),
        subject: item?.name ?? null,
        circuit: item?.circuit ?? null,
        failure,
        makersDiffer: item?.makersDiffer ?? true,
        sources: [item?.source, failure?.source].filter((s) => s !== undefined),
      }
    }
    case 'flash':
    case 'asShown':
      return unread(codeAsShown(seen))
    default:
      return assertNever(seen)
  }
}

/** What a code says and does not say about one machine; without `features` no fault is gated out. */
export function explainCode(index: BookIndex, seen: CodeSeen, features: Features = {}): CodeWords {
  const meaning = codeMeaning(index, seen)
  const { circuit, failure } = meaning
  const circuitWord = circuit === null ? null : wordName(index, 'circuit', circuit)
  const { supports, against } = split(index, circuit, failure, features)
  return {
    title: meaning.title,
    circuit: circuit === null || circuitWord === null ? null : { id: circuit, name: circuitWord },
    circuitName: meaning.subject ?? circuitWord ?? 'Circuit not in the code book',
    failure: failure === null ? null : { id: failure.id, name: failure.name },
    firstThought: failure?.firstThought ?? null,
    supportsWords: failure?.supports ?? null,
    arguesAgainstWords: failure?.arguesAgainst ?? null,
    kindSupports: supports,
    kindArguesAgainst: against,
    doesNotProve: doesNotProve(circuitWord, meaning.subject),
    makersDiffer: meaning.makersDiffer,
    unknown: meaning.subject === null && failure === null,
    source: meaning.sources.length > 0 ? [...new Set(meaning.sources)].join('; ') : 'as shown',
  }
}

/** Of 100 faults in a role, how many set this kind of failure (0 to 100); null when the kind is silent on roles. */
export const roleOf100 = (failure: FailureItem, role: CircuitRole): number | null =>
  failure.byRole === null ? null : (failure.byRole[role] ?? failure.otherwise)

const unread = (title: string): CodeMeaning => ({
  title,
  subject: null,
  circuit: null,
  failure: null,
  makersDiffer: true,
  sources: [],
})

function split(
  index: BookIndex,
  circuit: string | null,
  failure: FailureItem | null,
  features: Features,
): { supports: FaultRef[]; against: FaultRef[] } {
  if (circuit === null || failure === null) return { supports: [], against: [] }
  const refs: FaultRef[] = []
  for (const fault of index.faults.values()) {
    if (!letsThrough(fault.gate, features)) continue
    const seat = fault.circuits.find((c) => c.circuit === circuit)
    if (seat === undefined) continue
    const of100 = roleOf100(failure, seat.role)
    refs.push({ fault: fault.id, name: fault.name, role: seat.role, of100 })
  }
  const known = refs.flatMap((r) => (r.of100 === null ? [] : [{ ...r, of100: r.of100 }]))
  const mean = known.reduce((sum, r) => sum + r.of100, 0) / Math.max(1, known.length)
  const byMost = known.sort((a, b) => b.of100 - a.of100 || (a.fault < b.fault ? -1 : 1))
  return {
    supports: byMost.filter((r) => r.of100 >= mean),
    against: byMost.filter((r) => r.of100 < mean / 2),
  }
}

function doesNotProve(circuitWord: string | null, subject: string | null): string {
  if (circuitWord !== null)
    return `A code names a circuit, not a part: it does not prove the part at the end of "${circuitWord}" bad. Plug, wiring, supply and driver of that circuit can set it too.`
  if (subject !== null) return 'A code names a circuit, not a part: it does not prove any part bad.'
  return 'Not in the code book: it stays as entered and moves no suspect.'
}
