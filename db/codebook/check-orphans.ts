import { codeBookItem } from '@/lib/model/code-book'
import type { MachineModel } from '@/lib/model/machine-model'
import type { BookProblem, Books } from './book-problem'
import { usesOf } from './check-ids'

/** What a source may be: a standard or data set by name, practice, memory, a person's own measure, or the demo. */
const SOURCE =
  /common practice, no source|from memory|own words|SAE|ISO|IEC|JCGM|ANSI|ASTM|Standard Atmosphere|BCI|manual, page|own figure|read from|measured/
const INVENTED = /invented/

/** [CB4] Records whose figures do not say where they come from, and demo figures that do not say they are invented. */
export function checkSources({ shelf, models }: Books): BookProblem[] {
  const items = Object.values(shelf).flat()
  return [
    ...items.flatMap((item) => [
      ...sourceOf(item.id, item.source),
      ...(item.kind === 'check'
        ? [
            ...item.expected.flatMap((e) => sourceOf(item.id, e.source)),
            ...(item.reading?.fallback ? sourceOf(item.id, item.reading.fallback.source) : []),
          ]
        : []),
    ]),
    ...models.flatMap(modelSources),
  ]
}

function sourceOf(id: string, source: string): BookProblem[] {
  return SOURCE.test(source)
    ? []
    : [
        {
          kind: 'source',
          id,
          words: `"${source}" is no source: a standard by name, practice or memory`,
        },
      ]
}

function modelSources({ model, specSheet, source }: MachineModel): BookProblem[] {
  if (specSheet === null) return []
  const figures = [
    specSheet.showCodes.source,
    ...specSheet.components.flatMap((c) => [c.source, ...c.values.map((v) => v.source)]),
    ...specSheet.parts.map((p) => p.source),
  ]
  return [...new Set(figures)].flatMap((figure) => {
    if (specSheet.demo && !INVENTED.test(figure))
      return [
        {
          kind: 'source' as const,
          id: model,
          words: `demo figure "${figure}" does not say it is invented`,
        },
      ]
    return sourceOf(model, specSheet.demo ? `${figure}, ${source}, own figure` : figure)
  })
}

/** [CB5] Words, set-ups and failure kinds nothing uses, symptoms without faults, faults without shares. */
export function checkOrphans(books: Books): BookProblem[] {
  const used = new Set(usesOf(books).map((use) => `${use.kind}:${use.id}`))
  const { shelf } = books
  const orphan = (id: string, words: string): BookProblem => ({ kind: 'orphan', id, words })
  const words = [...shelf.part, ...shelf.tool, ...shelf.system, ...shelf.circuit, ...shelf.setup]
  const inCircuits = new Set(shelf.fault.flatMap((f) => f.circuits.map((c) => c.circuit)))
  return [
    ...words
      .filter((w) => !used.has(`${w.kind}:${w.id}`))
      .map((w) => orphan(w.id, `${w.kind} that nothing names`)),
    ...shelf.circuit
      .filter(({ id }) => !inCircuits.has(id))
      .map((c) => orphan(c.id, 'circuit that no fault sits in')),
    ...shelf.failure
      .filter((f) => f.fmi === null && !used.has(`failure:${f.id}`))
      .map((f) => orphan(f.id, 'failure kind that no code names')),
    ...shelf.symptom
      .filter((s) => s.opens === 'suspects' && !used.has(`symptom:${s.id}`))
      .map((s) => orphan(s.id, 'symptom that no fault shares')),
    ...shelf.fault
      .filter((f) => f.shares.length === 0)
      .map((f) => orphan(f.id, 'fault without a share of any symptom')),
    ...[...shelf.check, ...shelf.swap]
      .filter((c) => Object.keys(c.table).length === 0)
      .map((c) => orphan(c.id, `${c.kind} whose table names no fault`)),
  ]
}

/** [CB1] The shape of one item: null when it is right. */
export function shapeProblem(item: unknown): BookProblem | null {
  const parsed = codeBookItem.safeParse(item)
  if (parsed.success) return null
  const id = idOf(item)
  const issue = parsed.error.issues[0]
  return {
    kind: 'shape',
    id,
    words: `${issue?.path.join('.') ?? ''}: ${issue?.message ?? 'wrong shape'}`,
  }
}

const idOf = (item: unknown): string =>
  typeof item === 'object' && item !== null && 'id' in item ? String(item.id) : '(no id)'
