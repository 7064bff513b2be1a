import type { CheckItem, FaultItem, SwapItem } from '@/lib/model/code-book'
import { allows } from '@/lib/model/engine-state'
import type { Features, Gate } from '@/lib/model/features'
import type { MachineModel } from '@/lib/model/machine-model'
import {
  type BookProblem,
  type Books,
  COUNTS,
  machinesFor,
  passes,
  TELLS,
  widestRatio,
} from './book-problem'
import type { Unseparated } from './unseparated'

/** Least and most room of 100 for "something else" before a list is not believed (common practice, no source). */
const ROOM = { least: 3, most: 40 }
/** Least of 100 that a list still holds after a machine's own gates. */
const LEAST_LISTED = 50
const MOST_TWO_OR_MORE = 0.15

type Action = CheckItem | SwapItem

const shareOn = (fault: FaultItem, symptom: string, machine: Features): number[] =>
  fault.shares.filter((s) => s.symptom === symptom && passes(s.gate, machine)).map((s) => s.of100)

/** [CB9] [CB12] Shares of each group of machines: with "something else" they make 100, and few calls have two wrong. */
export function checkShares({ shelf }: Books): BookProblem[] {
  return shelf.symptom.flatMap(({ id, twoWrongOf100 }) => {
    const faults = shelf.fault.filter((f) => f.shares.some((s) => s.symptom === id))
    const list: List = { faults, symptom: id }
    const found = [...doubleShares(list), ...badRooms(list), ...thinLists(list)]
    const two: BookProblem = {
      kind: 'twoOrMore',
      id,
      words: `two or more wrong in ${twoWrongOf100} of 100 at the start; keep it under 15`,
    }
    return twoWrongOf100 / 100 >= MOST_TWO_OR_MORE ? [...found, two] : found
  })
}

type List = { faults: readonly FaultItem[]; symptom: string }

const ofShares = (id: string, words: string): BookProblem => ({ kind: 'shares', id, words })

const shareMachines = ({ faults }: List): Features[] =>
  machinesFor(faults.flatMap((f) => f.shares.map((s) => s.gate)))

function doubleShares(list: List): BookProblem[] {
  const machines = shareMachines(list)
  return list.faults
    .filter((f) => machines.some((m) => shareOn(f, list.symptom, m).length > 1))
    .map((f) => ofShares(f.id, `has two shares of ${list.symptom} on one machine`))
}

function badRooms(list: List): BookProblem[] {
  return shareMachines(list).flatMap((machine) => {
    const sum = list.faults.reduce((s, f) => s + (shareOn(f, list.symptom, machine)[0] ?? 0), 0)
    const room = 100 - sum
    return sum === 0 || (room > ROOM.least - 1e-9 && room <= ROOM.most)
      ? []
      : [
          ofShares(
            list.symptom,
            `${nameOf(machine)}: listed ${round(sum)}, something else ${round(room)} of 100`,
          ),
        ]
  })
}

function thinLists({ faults, symptom }: List): BookProblem[] {
  return machinesFor(listGates(faults)).flatMap((machine) => {
    const open = faults.filter((f) => passes(f.gate, machine))
    const sum = open.reduce((total, f) => total + (shareOn(f, symptom, machine)[0] ?? 0), 0)
    return sum > 0 && sum < LEAST_LISTED
      ? [ofShares(symptom, `${nameOf(machine)}: its gates leave ${round(sum)} of 100 listed`)]
      : []
  })
}

const listGates = (faults: readonly FaultItem[]): Gate[] =>
  faults.flatMap((f) => [f.gate, ...f.shares.map((s) => s.gate)])

/** [CB10] [CB11] Faults no action can reach, and pairs of one list that no action tells apart. */
export function checkReach(books: Books, unseparated: readonly Unseparated[]): BookProblem[] {
  return books.shelf.symptom.flatMap(({ id: symptom, engine }) => {
    const actions: Action[] = [
      ...books.shelf.check.filter((check) => allows(engine, check.machineState)),
      ...books.shelf.swap,
    ]
    const faults = books.shelf.fault.filter((f) => f.shares.some((s) => s.symptom === symptom))
    const sees = seenTogether({ faults, symptom })
    return [
      ...faults.flatMap((f) => unreachable({ fault: f, actions, sees })),
      ...pairsOf(faults).flatMap((pair) => inseparable({ pair, actions, sees, unseparated })),
      ...books.models.flatMap((model) => onModel({ model, faults, symptom, actions, unseparated })),
    ]
  })
}

type Sees = (faults: readonly FaultItem[], action: Action) => boolean

/** Whether some machine has all these faults on its list and lets this action be done. */
function seenTogether({ faults, symptom }: List): Sees {
  const machines = machinesFor(listGates(faults))
  const listed = new Map(
    faults.map((f) => [
      f.id,
      machines.map((m) => passes(f.gate, m) && shareOn(f, symptom, m).length > 0),
    ]),
  )
  return (some, action) =>
    machines.some(
      (m, i) => passes(action.gate, m) && some.every((f) => listed.get(f.id)?.[i] === true),
    )
}

const rowOf = (action: Action, fault: string): readonly number[] =>
  action.table[fault] ?? action.otherwise

const tellsApart = (action: Action, a: string, b: string): boolean =>
  widestRatio(action, [rowOf(action, a), rowOf(action, b)], COUNTS.forPair) >= TELLS

function unreachable(x: { fault: FaultItem; actions: Action[]; sees: Sees }): BookProblem[] {
  const { fault, actions, sees } = x
  const reached = actions.some(
    (a) =>
      widestRatio(a, [rowOf(a, fault.id), a.otherwise], COUNTS.forPair) >= TELLS &&
      sees([fault], a),
  )
  return reached
    ? []
    : [{ kind: 'unreachable', id: fault.id, words: 'no check or swap of its machines moves it' }]
}

function inseparable(x: {
  pair: readonly [FaultItem, FaultItem]
  actions: Action[]
  sees: Sees
  unseparated: readonly Unseparated[]
}): BookProblem[] {
  const [a, b] = x.pair
  const anyAction = { gate: {} } as Action
  if (!x.sees(x.pair, anyAction)) return []
  const apart = x.actions.some((action) => tellsApart(action, a.id, b.id) && x.sees(x.pair, action))
  const reason = reasonFor(x.unseparated, a.id, b.id)
  if (apart === (reason === undefined)) return []
  const words = apart
    ? 'is in the table of pairs left together, but an action tells them apart'
    : 'no check or swap tells them apart, and no reason is given'
  return [{ kind: 'inseparable', id: `${a.id} and ${b.id}`, words }]
}

function onModel(x: {
  model: MachineModel
  faults: FaultItem[]
  symptom: string
  actions: Action[]
  unseparated: readonly Unseparated[]
}): BookProblem[] {
  const { model, symptom } = x
  const here = x.faults.filter(
    (f) => passes(f.gate, model.features) && shareOn(f, symptom, model.features).length > 0,
  )
  const actions = x.actions.filter((a) => passes(a.gate, model.features))
  return pairsOf(here).flatMap(([a, b]) => {
    const apart = actions.some((action) => tellsApart(action, a.id, b.id))
    return apart || reasonFor(x.unseparated, a.id, b.id) !== undefined
      ? []
      : [
          {
            kind: 'inseparable' as const,
            id: `${a.id} and ${b.id}`,
            words: `no check or swap tells them apart on the ${model.model}`,
          },
        ]
  })
}

const reasonFor = (list: readonly Unseparated[], a: string, b: string): string | undefined =>
  list.find(({ faults: [x, y] }) => (x === a && y === b) || (x === b && y === a))?.reason

function pairsOf(faults: readonly FaultItem[]): (readonly [FaultItem, FaultItem])[] {
  return faults.flatMap((a, i) => faults.slice(i + 1).map((b) => [a, b] as const))
}

const nameOf = (machine: Features): string =>
  Object.entries(machine)
    .map(([name, value]) => `${name} ${value}`)
    .join(', ') || 'any machine'

const round = (x: number): number => Math.round(x * 100) / 100
