import type { PcodeItem, SpnItem } from '@/lib/model/code-book'
import { type BookProblem, type Books, TELLS } from './book-problem'

type Told = { id: string; tells: NonNullable<SpnItem['tells']> }

/** [CB22] What codes tell: no fault sets one less often than none does, some do far more often, one story has one set of figures. */
export function checkCodes({ shelf }: Books): BookProblem[] {
  const told = [...shelf.spn, ...shelf.pcode].flatMap(toldBy)
  return [...told.flatMap(figures), ...stories(told)]
}

const toldBy = ({ id, tells }: SpnItem | PcodeItem): Told[] =>
  tells === null ? [] : [{ id, tells }]

function figures({ id, tells: { of100, otherwise } }: Told): BookProblem[] {
  const worse = Object.entries(of100).filter(([, figure]) => figure < otherwise)
  const isTold = Object.values(of100).some((figure) => figure >= TELLS * otherwise)
  return [
    ...worse.map(([fault]) => ({
      kind: 'order' as const,
      id,
      words: `with ${fault} it is set less often than with none: a fault cannot mend`,
    })),
    ...(isTold
      ? []
      : [{ kind: 'tellsNothing' as const, id, words: `no fault sets it ${TELLS} times as often` }]),
  ]
}

function stories(told: readonly Told[]): BookProblem[] {
  const first = new Map<string, string>()
  return told.flatMap(({ id, tells: { id: story, of100, otherwise } }) => {
    const text = JSON.stringify([of100, otherwise])
    const known = first.get(story)
    if (known === undefined) first.set(story, text)
    return known === undefined || known === text
      ? []
      : [{ kind: 'order' as const, id, words: `tells the story ${story} with other figures` }]
  })
}
