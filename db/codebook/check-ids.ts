import { FEATURES, type FeatureName, type Gate } from '@/lib/model/features'
import type { BookProblem, Books } from './book-problem'

type Sets = Record<
  'symptom' | 'fault' | 'check' | 'circuit' | 'setup' | 'tool' | 'part' | 'system' | 'failure',
  ReadonlySet<string>
>

/** [CB2] [CB3] Ids that stand twice, and names that lead nowhere. */
export function checkIds(books: Books): BookProblem[] {
  return [...twice(books), ...unresolved(books), ...gates(books), ...setupRings(books)]
}

function twice({ shelf, models }: Books): BookProblem[] {
  const seen = new Set<string>()
  const ids = [
    ...Object.values(shelf).flatMap((items) => items.map((i) => i.id)),
    ...models.map((m) => m.id),
  ]
  return ids.flatMap((id) => {
    if (!seen.has(id)) {
      seen.add(id)
      return []
    }
    return [{ kind: 'idTwice' as const, id, words: 'stands twice; ids are unique over all kinds' }]
  })
}

function setsOf({ shelf }: Books): Sets {
  const ids = (items: readonly { id: string }[]) => new Set(items.map((i) => i.id))
  return {
    symptom: ids(shelf.symptom),
    fault: ids(shelf.fault),
    check: ids(shelf.check),
    circuit: ids(shelf.circuit),
    setup: ids(shelf.setup),
    tool: ids(shelf.tool),
    part: ids(shelf.part),
    system: ids(shelf.system),
    failure: ids(shelf.failure),
  }
}

type Use = { by: string; kind: keyof Sets; id: string }

/** Every use of an id by another record of the book or of a spec sheet. */
export function usesOf({ shelf, models }: Books): Use[] {
  const list = (by: string, kind: keyof Sets, ids: readonly (string | null)[]): Use[] =>
    ids.flatMap((id) => (id === null ? [] : [{ by, kind, id }]))
  return [
    ...shelf.fault.flatMap((f) => [
      ...list(f.id, 'system', [f.system]),
      ...list(
        f.id,
        'symptom',
        f.shares.map((s) => s.symptom),
      ),
      ...list(
        f.id,
        'circuit',
        f.circuits.map((c) => c.circuit),
      ),
      ...list(f.id, 'part', [f.repair?.part ?? null]),
      ...list(f.id, 'setup', f.repair?.setups ?? []),
    ]),
    ...shelf.symptom.flatMap((s) => list(s.id, 'check', s.firstLook)),
    ...shelf.symptom.flatMap((s) =>
      s.conditions.flatMap((c) => list(s.id, 'fault', Object.keys(c.tells?.of100 ?? {}))),
    ),
    ...shelf.check.flatMap((c) => [
      ...list(c.id, 'setup', c.setups),
      ...list(
        c.id,
        'tool',
        c.tools.map((t) => t.tool),
      ),
      ...list(c.id, 'fault', [...Object.keys(c.table), ...Object.keys(c.reading?.byFault ?? {})]),
    ]),
    ...shelf.swap.flatMap((s) => [
      ...list(s.id, 'fault', [s.fault, ...Object.keys(s.table)]),
      ...list(s.id, 'part', [s.part]),
      ...list(s.id, 'setup', s.setups),
    ]),
    ...shelf.setup.flatMap((s) => list(s.id, 'setup', s.requires)),
    ...[...shelf.spn, ...shelf.pcode].flatMap((code) => [
      ...list(code.id, 'circuit', [code.circuit]),
      ...list(code.id, 'fault', Object.keys(code.tells?.of100 ?? {})),
    ]),
    ...shelf.pcode.flatMap((p) => list(p.id, 'failure', [p.failure])),
    ...models.flatMap((m) => [
      ...list(m.model, 'setup', m.specSheet?.components.flatMap((c) => c.setups) ?? []),
      ...list(m.model, 'part', m.specSheet?.parts.map((p) => p.part) ?? []),
    ]),
  ]
}

function unresolved(books: Books): BookProblem[] {
  const sets = setsOf(books)
  return usesOf(books).flatMap(({ by, kind, id }) =>
    sets[kind].has(id)
      ? []
      : [
          {
            kind: 'unresolved' as const,
            id: by,
            words: `names the ${kind} "${id}", which is not there`,
          },
        ],
  )
}

function gates({ shelf }: Books): BookProblem[] {
  const all: [string, Gate][] = [
    ...[...shelf.symptom, ...shelf.fault, ...shelf.check, ...shelf.swap].map(
      (i): [string, Gate] => [i.id, i.gate],
    ),
    ...shelf.fault.flatMap((f) => f.shares.map((s): [string, Gate] => [f.id, s.gate])),
  ]
  const wrongGates = all.flatMap(([id, gate]) =>
    Object.entries(gate).flatMap(([name, values]) => {
      const known: readonly string[] = FEATURES[name as FeatureName]
      return values
        .filter((v) => !known.includes(v))
        .map((v) => ({
          kind: 'unresolved' as const,
          id,
          words: `its gate allows ${name} "${v}", which no machine has`,
        }))
    }),
  )
  return [...wrongGates, ...featureAnswers(shelf)]
}

function featureAnswers(shelf: Books['shelf']): BookProblem[] {
  return Object.entries(FEATURES).flatMap(([name, values]) => {
    const item = shelf.feature.find((f) => f.id === name)
    const answers = Object.keys(item?.answers ?? {})
    const same = answers.length === values.length && values.every((v) => answers.includes(v))
    return same
      ? []
      : [
          {
            kind: 'unresolved' as const,
            id: name,
            words: 'its answers are not the values it can take',
          },
        ]
  })
}

function setupRings({ shelf }: Books): BookProblem[] {
  const requires = new Map(shelf.setup.map((s) => [s.id, s.requires]))
  const reaches = (from: string, to: string, seen: Set<string>): boolean =>
    (requires.get(from) ?? []).some((next) => {
      if (next === to) return true
      if (seen.has(next)) return false
      seen.add(next)
      return reaches(next, to, seen)
    })
  return shelf.setup
    .filter((s) => reaches(s.id, s.id, new Set()))
    .map((s) => ({ kind: 'unresolved', id: s.id, words: 'requires itself in a ring' }))
}
