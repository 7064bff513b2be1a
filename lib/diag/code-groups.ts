/**
 * Several codes at once, grouped by what could have set them together, before any single suspect (rule R11). A
 * cause is said only where a code leads to it, or where three circuits or more are off in a way that a lost ground
 * makes. Grouping convicts nothing: it says where to look first and why.
 */
import type { CodeContext, CodeSeen } from '@/lib/model/code-seen'
import { type BookIndex, wordName } from './book-index'
import {
  CAUSES,
  COMMON_CAUSES,
  type CodeFacts,
  type CommonCause,
  factsOf,
  GROUND_CIRCUITS,
} from './code-causes'
import { codeMeaning } from './code-words'

/** A code on record and whether it is active now. */
export type CodeOnRecord = { seen: CodeSeen; status: CodeContext['status'] }

/** Codes that belong together, the group to look at first coming first. */
export type CodeGroup = {
  /** `circuit`: no common cause, one circuit's own codes. `unread`: the book knows neither circuit nor kind. */
  cause: CommonCause | 'circuit' | 'unread'
  name: string
  /** Codes that lead to the cause, and codes it can have set; both in the order recorded. */
  leads: CodeOnRecord[]
  canBeSetByIt: CodeOnRecord[]
  /** True when a leading code is active: else the cause may have passed, as after a weak start. */
  activeNow: boolean
  lookFirst: string | null
  why: string
  doesNotProve: string | null
  source: string
}

type Read = { code: CodeOnRecord; facts: CodeFacts; firstThought: string | null; sources: string[] }

/** The groups, common causes first and in their order, then single circuits as recorded; empty without codes. */
export function groupCodes(index: BookIndex, codes: readonly CodeOnRecord[]): CodeGroup[] {
  let left = codes.map((code) => readCode(index, code))
  const groups: CodeGroup[] = []
  for (const cause of COMMON_CAUSES) {
    const taken = takenBy(cause, left)
    if (taken === null) continue
    groups.push(groupOf(cause, taken))
    const used = new Set([...taken.leads, ...taken.set])
    left = left.filter((read) => !used.has(read))
  }
  const circuits = [...new Set(left.map(({ facts }) => facts.circuit ?? facts.title))]
  const own = circuits.map((circuit) =>
    circuitGroup(
      index,
      left.filter(({ facts }) => (facts.circuit ?? facts.title) === circuit),
    ),
  )
  return [...groups, ...own]
}

function readCode(index: BookIndex, code: CodeOnRecord): Read {
  const { seen } = code
  const meaning = codeMeaning(index, seen)
  const group =
    seen.format === 'spn'
      ? index.spns.get(seen.spn)?.group
      : seen.format === 'pcode'
        ? index.pcodes.get(seen.code)?.group
        : undefined
  const isNetworkCode = seen.format === 'pcode' && seen.code.startsWith('U')
  return {
    code,
    facts: factsOf(meaning, { group: group ?? null, isNetworkCode }),
    firstThought: meaning.failure?.firstThought ?? null,
    sources: meaning.sources,
  }
}

type Taken = { leads: Read[]; set: Read[] }

/** The codes a cause takes, or null when nothing leads to it. A low supply takes along what the rail would set. */
function takenBy(cause: CommonCause, left: readonly Read[]): Taken | null {
  const { leads, canSet } = CAUSES[cause]
  if (cause === 'ground') {
    const set = left.filter(({ facts }) => canSet(facts))
    const circuits = new Set(set.map(({ facts }) => facts.circuit ?? facts.title))
    return circuits.size >= GROUND_CIRCUITS ? { leads: [], set } : null
  }
  const leading = left.filter(({ facts }) => leads(facts))
  if (leading.length === 0) return null
  const others = left.filter((read) => !leading.includes(read))
  const set = others.filter(({ facts }) => canSet(facts))
  const { sensorSupply } = CAUSES
  const railDown = cause === 'lowSupply' && set.some(({ facts }) => sensorSupply.leads(facts))
  const further = railDown
    ? others.filter((read) => !set.includes(read) && sensorSupply.canSet(read.facts))
    : []
  return { leads: leading, set: others.filter((r) => set.includes(r) || further.includes(r)) }
}

function groupOf(cause: CommonCause, { leads, set }: Taken): CodeGroup {
  const row = CAUSES[cause]
  const leading = titles(leads)
  return {
    cause,
    name: row.name,
    leads: leads.map(({ code }) => code),
    canBeSetByIt: set.map(({ code }) => code),
    activeNow: (leads.length > 0 ? leads : set).some(({ code }) => code.status === 'active'),
    lookFirst: row.lookFirst,
    why: whyOf(row.name, leading, titles(set)),
    doesNotProve: leads.length === 0 ? row.doesNotProve : `${leading} ${row.doesNotProve}`,
    source: row.source,
  }
}

function whyOf(name: string, leading: string, set: string): string {
  const cause = name.replace(/^[A-Z](?=[a-z])/, (letter) => letter.toLowerCase())
  if (leading === '') return `${set} together: a ${cause} would set them all.`
  if (set === '') return `${leading} speaks of: ${cause}.`
  return `${leading} speaks of: ${cause}. That can set ${set} as well, so it comes first.`
}

function circuitGroup(index: BookIndex, reads: readonly Read[]): CodeGroup {
  const circuit = reads[0]?.facts.circuit ?? null
  const known = circuit !== null || reads.some(({ facts }) => facts.kind !== null)
  const sources = [...new Set(reads.flatMap((read) => read.sources))]
  return {
    cause: known ? 'circuit' : 'unread',
    name: circuit === null ? titles(reads) : wordName(index, 'circuit', circuit),
    leads: reads.map(({ code }) => code),
    canBeSetByIt: [],
    activeNow: reads.some(({ code }) => code.status === 'active'),
    lookFirst: reads.map((read) => read.firstThought).find((words) => words !== null) ?? null,
    why: known ? 'No other code here shares a cause with it.' : 'The code book does not know it.',
    doesNotProve: null,
    source: sources.length > 0 ? sources.join('; ') : 'as shown',
  }
}

/** Code headings as a sentence lists them: one; one and another; one, another and a third. */
function titles(reads: readonly Read[]): string {
  const all = reads.map(({ facts }) => facts.title)
  return all.length < 2 ? all.join('') : `${all.slice(0, -1).join(', ')} and ${all.at(-1)}`
}
