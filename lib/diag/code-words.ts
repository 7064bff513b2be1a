/**
 * A trouble code in plain words. The code names a circuit and a kind of failure, never a part. A kind
 * supports a fault when at least as many of 100 faults in its role set it as the circuit's faults do on
 * average (no fault of the circuit weighed above another), and argues against it below half of that.
 */
import type { FailureItem, PcodeItem, SpnItem } from '@/lib/model/code-book'
import type { CodeSeen } from '@/lib/model/code-seen'
import type { CircuitRole, CodeTells } from '@/lib/model/code-table'
import type { Features } from '@/lib/model/features'
import { assertNever } from '@/lib/model/result'
import { type BookIndex, failureOf, wordName } from './book-index'
import { formWords, suffixKind } from './code-areas'
import { parsePcode } from './codes'
import { letsThrough } from './gate'

/**
 * A fault as a code speaks of it: `of100` such faults in its role set this kind, or with this fault set this code
 * where it has no role in the circuit; null when the book is silent.
 */
export type FaultRef = {
  fault: string
  name: string
  role: CircuitRole | null
  of100: number | null
}

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
  /** What a code of this kind leaves open; null where the kind is not known. */
  kindDoesNotProve: string | null
  /** What the number's form says where the book has no word for it. */
  formWords: string | null
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
  /** What it tells of faults beside its circuit, under this kind. */
  tells: CodeTells | null
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
    case 'spn':
      return spnMeaning(index, seen)
    case 'pcode':
      return pcodeMeaning(index, seen)
    case 'flash':
    case 'asShown':
      return unread(codeAsShown(seen))
    default:
      return assertNever(seen)
  }
}

function spnMeaning(index: BookIndex, seen: Extract<CodeSeen, { format: 'spn' }>): CodeMeaning {
  const item = index.spns.get(seen.spn)
  const failure = index.failuresByFmi.get(seen.fmi) ?? null
  const tells = item?.tells ?? null
  const isTold = tells !== null && (tells.fmis === null || tells.fmis.includes(seen.fmi))
  return { ...meaningOf(seen, item, failure), tells: isTold ? tells : null }
}

function pcodeMeaning(index: BookIndex, seen: Extract<CodeSeen, { format: 'pcode' }>): CodeMeaning {
  const item = index.pcodes.get(seen.code)
  const kind = item?.failure ?? kindByForm(seen.code)
  const failure = kind === null ? null : failureOf(index, kind)
  return { ...meaningOf(seen, item, failure), tells: item?.tells ?? null }
}

const meaningOf = (
  seen: CodeSeen,
  item: SpnItem | PcodeItem | undefined,
  failure: FailureItem | null,
): CodeMeaning => ({
  ...unread(codeAsShown(seen)),
  subject: item?.name ?? null,
  circuit: item?.circuit ?? null,
  failure,
  makersDiffer: item?.makersDiffer ?? true,
  sources: [item?.source, failure?.source].filter((s) => s !== undefined),
})

/** The kind that the last digit of a standard code names, where its group is known to follow the rule. */
function kindByForm(text: string): string | null {
  const code = parsePcode(text)
  return code.ok ? suffixKind(code.value) : null
}

/** What a code says and does not say about one machine; without `features` no fault is gated out. */
export function explainCode(index: BookIndex, seen: CodeSeen, features: Features = {}): CodeWords {
  const meaning = codeMeaning(index, seen)
  const { circuit, failure, subject } = meaning
  const circuitWord = circuit === null ? null : wordName(index, 'circuit', circuit)
  const { supports, against } = split(index, meaning, features)
  return {
    title: meaning.title,
    circuit: circuit === null || circuitWord === null ? null : { id: circuit, name: circuitWord },
    circuitName: subject ?? circuitWord ?? 'Circuit not in the code book',
    failure: failure === null ? null : { id: failure.id, name: failure.name },
    firstThought: failure?.firstThought ?? null,
    supportsWords: failure?.supports ?? null,
    arguesAgainstWords: failure?.arguesAgainst ?? null,
    kindSupports: supports,
    kindArguesAgainst: against,
    doesNotProve: doesNotProve(circuitWord, subject),
    kindDoesNotProve: failure?.doesNotProve ?? null,
    formWords: subject === null ? formWords(seen) : null,
    makersDiffer: meaning.makersDiffer,
    unknown: subject === null && failure === null,
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
  tells: null,
  makersDiffer: true,
  sources: [],
})

function split(
  index: BookIndex,
  { circuit, failure, tells }: CodeMeaning,
  features: Features,
): { supports: FaultRef[]; against: FaultRef[] } {
  const known: (FaultRef & { of100: number })[] = []
  const told: typeof known = []
  for (const { id: fault, name, gate, circuits } of index.faults.values()) {
    if (!letsThrough(gate, features)) continue
    const said = tells?.of100[fault]
    if (said !== undefined) told.push({ fault, name, role: null, of100: said })
    const seat = circuits.find((c) => c.circuit === circuit)
    if (seat === undefined || failure === null || said !== undefined) continue
    const of100 = roleOf100(failure, seat.role)
    if (of100 !== null) known.push({ fault, name, role: seat.role, of100 })
  }
  const mean = known.reduce((sum, r) => sum + r.of100, 0) / Math.max(1, known.length)
  const byMost = (a: FaultRef & { of100: number }, b: FaultRef & { of100: number }) =>
    b.of100 - a.of100 || (a.fault < b.fault ? -1 : 1)
  return {
    supports: [...known.filter((r) => r.of100 >= mean), ...told].sort(byMost),
    against: known.filter((r) => r.of100 < mean / 2).sort(byMost),
  }
}

function doesNotProve(circuitWord: string | null, subject: string | null): string {
  if (circuitWord !== null)
    return `A code names a circuit, not a part: it does not prove the part at the end of "${circuitWord}" bad. Plug, wiring, supply and driver of that circuit can set it too.`
  if (subject !== null)
    return 'A code names what was seen, not a part: it does not prove any part bad.'
  return 'Not in the code book: it stays as entered and moves no suspect.'
}
