import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { BOOK_PROBLEMS, type BookProblemKind } from '@/db/codebook/book-problem'
import { checkBook } from '@/db/codebook/check-book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import type { CodeBookItem } from '@/lib/model/code-book'

type Kind = CodeBookItem['kind']
type Of<K extends Kind> = Extract<CodeBookItem, { kind: K }>
type Book = {
  items: CodeBookItem[]
  models: typeof DEMO_MODELS
  item: <K extends Kind>(kind: K, id: string) => Of<K>
}

function copy(): Book {
  const items = structuredClone(BOOK_ITEMS)
  return {
    items,
    models: structuredClone(DEMO_MODELS),
    item: <K extends Kind>(kind: K, id: string) => {
      const found = items.find((i) => i.kind === kind && i.id === id)
      if (found === undefined) throw new Error(`no ${kind} ${id}`)
      return found as Of<K>
    },
  }
}

const coilWeights = (book: Book) =>
  book.item('check', 'coilPrimaryResistance').reading?.byFault.ignitionCoilPart ?? []

/** One way to break a book: the finding it must make, and where. */
const BREAKS: [rule: string, kind: BookProblemKind, at: RegExp, breakIt: (book: Book) => void][] = [
  [
    'CB1 a figure that is not one',
    'shape',
    /coilSwap/,
    (b) => {
      b.item('swap', 'coilSwap').minutes = Number.NaN
    },
  ],
  [
    'CB1 a check without steps',
    'shape',
    /plugRead/,
    (b) => {
      b.item('check', 'plugRead').steps = []
    },
  ],
  [
    'CB1 a model of the wrong shape',
    'shape',
    /Moor 450/,
    (b) => {
      const sheet = b.models[0]?.specSheet
      if (sheet) sheet.parts[0]!.genuineMinor = 12.5
    },
  ],
  [
    'CB2 an id twice in one kind',
    'idTwice',
    /plugRead/,
    (b) => {
      b.items.push(structuredClone(b.item('check', 'plugRead')))
    },
  ],
  [
    'CB2 an id twice across kinds',
    'idTwice',
    /relay/,
    (b) => {
      b.items.push({ kind: 'tool', id: 'relay', name: 'A relay', source: 'own words' })
    },
  ],
  [
    'CB3 a circuit that is not there',
    'unresolved',
    /crankSensorPart/,
    (b) => {
      b.item('fault', 'crankSensorPart').circuits = [{ circuit: 'crankSensr', role: 'sensor' }]
    },
  ],
  [
    'CB3 a set-up that is not there',
    'unresolved',
    /plugRead/,
    (b) => {
      b.item('check', 'plugRead').setups.push('plugOff')
    },
  ],
  [
    'CB3 a tool that is not there',
    'unresolved',
    /plugRead/,
    (b) => {
      b.item('check', 'plugRead').tools.push({ tool: 'magicWand', accuracy: null })
    },
  ],
  [
    'CB3 a fault in a table that is not there',
    'unresolved',
    /openCapTest/,
    (b) => {
      b.item('check', 'openCapTest').table.tankVentBlockd = [10, 24, 66]
    },
  ],
  [
    'CB3 a part that is not there',
    'unresolved',
    /coilSwap/,
    (b) => {
      b.item('swap', 'coilSwap').part = 'ignitionCoilPack'
    },
  ],
  [
    'CB3 a symptom that is not there',
    'unresolved',
    /tankVentBlocked/,
    (b) => {
      b.item('fault', 'tankVentBlocked').shares[0]!.symptom = 'startsThenDie'
    },
  ],
  [
    'CB3 a failure kind that is not there',
    'unresolved',
    /pcodeP0351/,
    (b) => {
      b.item('pcode', 'pcodeP0351').failure = 'sideways'
    },
  ],
  [
    'CB3 a component set-up that is not there',
    'unresolved',
    /Moor 450/,
    (b) => {
      b.models[0]?.specSheet?.components[0]?.setups.push('roofOff')
    },
  ],
  [
    'CB3 a gate value no machine has',
    'unresolved',
    /valveTight/,
    (b) => {
      b.item('fault', 'valveTight').gate = { strokes: ['five'] }
    },
  ],
  [
    'CB3 a question without all its answers',
    'unresolved',
    /battery/,
    (b) => {
      b.item('feature', 'battery').answers = { yes: 'Has a battery' }
    },
  ],
  [
    'CB3 a ring of set-ups',
    'unresolved',
    /seatOff/,
    (b) => {
      b.item('setup', 'seatOff').requires = ['tankCoverOff']
    },
  ],
  [
    'CB4 a record without a true source',
    'source',
    /coilPeakVolts/,
    (b) => {
      b.item('check', 'coilPeakVolts').source = 'somebody said so'
    },
  ],
  [
    'CB4 an expected value without a true source',
    'source',
    /batteryRest/,
    (b) => {
      b.item('check', 'batteryRest').expected[0]!.source = 'the internet'
    },
  ],
  [
    'CB4 a demo figure that does not say it is invented',
    'source',
    /Moor 450/,
    (b) => {
      b.models[0]!.specSheet!.components[0]!.values[0]!.source = 'manual, page 41'
    },
  ],
  [
    'CB5 a part nothing names',
    'orphan',
    /spareWheel/,
    (b) => {
      b.items.push({ kind: 'part', id: 'spareWheel', name: 'Spare wheel', source: 'own words' })
    },
  ],
  [
    'CB5 a circuit no fault sits in',
    'orphan',
    /idleAir/,
    (b) => {
      b.item('fault', 'idleAirStuck').circuits = []
    },
  ],
  [
    'CB5 a fault without shares',
    'orphan',
    /reedBroken/,
    (b) => {
      b.item('fault', 'reedBroken').shares = []
    },
  ],
  [
    'CB5 a symptom without faults',
    'orphan',
    /backfires/,
    (b) => {
      b.items.push({ ...b.item('symptom', 'startsThenDies'), id: 'backfires' })
    },
  ],
  [
    'CB6 a row that does not add up',
    'rows',
    /openCapTest/,
    (b) => {
      b.item('check', 'openCapTest').otherwise = [86, 11, 4]
    },
  ],
  [
    'CB6 a row of the wrong length',
    'rows',
    /openCapTest/,
    (b) => {
      b.item('check', 'openCapTest').table.tankVentBlocked = [40, 60]
    },
  ],
  [
    'CB6 a swap row that does not add up',
    'rows',
    /relaySwap/,
    (b) => {
      b.item('swap', 'relaySwap').otherwise = [88, 11, 2]
    },
  ],
  [
    'CB7 the good outcome not first',
    'order',
    /openCapTest/,
    (b) => {
      b.item('check', 'openCapTest').outcomes.reverse()
    },
  ],
  [
    'CB7 a fault that mends',
    'order',
    /plugRead/,
    (b) => {
      b.item('check', 'plugRead').table.fuelOutOrShut = [90, 6, 4]
    },
  ],
  [
    'CB7 a swap that follows another fault',
    'order',
    /coilSwap/,
    (b) => {
      b.item('swap', 'coilSwap').table.ignitionCoilDriver = [4, 4, 92]
    },
  ],
  [
    'CB8 a check that tells nothing',
    'tellsNothing',
    /exhaustLook/,
    (b) => {
      b.item('check', 'exhaustLook').table.exhaustBlocked = [90, 8, 2]
      b.item('check', 'exhaustLook').otherwise = [92, 6, 2]
    },
  ],
  [
    'CB9 a list without room for something else',
    'shares',
    /startsThenDies/,
    (b) => {
      for (const s of b.item('fault', 'fuelOutOrShut').shares) s.of100 += 6
    },
  ],
  [
    'CB9 two shares on one machine',
    'shares',
    /reedBroken/,
    (b) => {
      b.item('fault', 'reedBroken').shares.push({ symptom: 'startsThenDies', gate: {}, of100: 1 })
    },
  ],
  [
    'CB9 a list its own gates cut to pieces',
    'shares',
    /startsThenDies/,
    (b) => {
      for (const item of b.items)
        if (item.kind === 'fault' && item.system === 'fuelSystem')
          item.gate = { cylinders: ['two'] }
    },
  ],
  [
    'CB10 a fault nothing reaches',
    'unreachable',
    /exhaustBlocked/,
    (b) => {
      b.item('check', 'exhaustLook').table = { airFilterBlocked: [12, 18, 70] }
    },
  ],
  [
    'CB10 a fault whose only check its machines shut out',
    'unreachable',
    /reedBroken/,
    (b) => {
      b.item('check', 'reedLook').gate = { strokes: ['four'] }
    },
  ],
  [
    'CB11 a pair nothing tells apart',
    'inseparable',
    /^exhaustBlocked and reedBroken/,
    (b) => {
      const table = b.item('check', 'exhaustLook').table
      table.reedBroken = table.exhaustBlocked!
      b.item('check', 'reedLook').table.exhaustBlocked = [4, 20, 76]
    },
  ],
  [
    'CB12 two wrong too often',
    'twoOrMore',
    /startsThenDies/,
    (b) => {
      b.item('symptom', 'startsThenDies').twoWrongOf100 = 15
    },
  ],
  [
    'CB13 cranking without a word that it may move',
    'caution',
    /batteryCranking/,
    (b) => {
      const check = b.item('check', 'batteryCranking')
      check.cautions = check.cautions.filter((c) => c.signal === 'DANGER')
      for (const step of check.steps) step.caution = null
    },
  ],
  [
    'CB13 fuel opened without DANGER',
    'caution',
    /fuelSample/,
    (b) => {
      const check = b.item('check', 'fuelSample')
      check.cautions = []
      for (const step of check.steps) step.caution = null
    },
  ],
  [
    'CB13 power on close to fuel',
    'caution',
    /pumpPlugVolts/,
    (b) => {
      const check = b.item('check', 'pumpPlugVolts')
      check.cautions = []
      for (const step of check.steps) step.caution = null
    },
  ],
  [
    'CB13 spark without high voltage',
    'caution',
    /sparkWhileItDies/,
    (b) => {
      const check = b.item('check', 'sparkWhileItDies')
      check.cautions = check.cautions.filter((c) => !c.text.includes('high voltage'))
      for (const step of check.steps) step.caution = null
    },
  ],
  [
    'CB13 running without exhaust gas',
    'caution',
    /littleThrottle/,
    (b) => {
      const check = b.item('check', 'littleThrottle')
      check.cautions = check.cautions.filter((c) => !c.text.includes('Exhaust'))
    },
  ],
  [
    'CB13 a battery without its gas',
    'caution',
    /postDrop/,
    (b) => {
      const check = b.item('check', 'postDrop')
      check.cautions = check.cautions.filter((c) => c.signal !== 'DANGER')
      for (const step of check.steps) step.caution = null
    },
  ],
  [
    'CB13 an engine that turns and may not move',
    'caution',
    /littleThrottle/,
    (b) => {
      b.item('check', 'littleThrottle').mayMoveMachine = false
    },
  ],
  [
    'CB13 a swap that starts it unwarned',
    'caution',
    /relaySwap/,
    (b) => {
      b.item('swap', 'relaySwap').cautions = []
    },
  ],
  [
    'CB14 a guide opening fuel',
    'guideSafe',
    /fuelSample/,
    (b) => {
      b.item('check', 'fuelSample').guideSafe = true
      b.item('check', 'fuelSample').roles = ['mechanic', 'guide']
    },
  ],
  [
    'CB14 guide-safe and no guide',
    'guideSafe',
    /fuelLevelTap/,
    (b) => {
      b.item('check', 'fuelLevelTap').roles = ['mechanic']
    },
  ],
  [
    'CB14 a guide at high voltage',
    'guideSafe',
    /coilSwap/,
    (b) => {
      b.item('swap', 'coilSwap').guideSafe = true
    },
  ],
  [
    'CB15 a reading no spec sheet has',
    'reading',
    /coilPrimaryResistance/,
    (b) => {
      b.item('check', 'coilPrimaryResistance').reading!.value = 'secondaryResistance'
    },
  ],
  [
    'CB15 pieces that do not weigh one',
    'reading',
    /coilPrimaryResistance/,
    (b) => {
      coilWeights(b)[0]!.weight = 0.5
    },
  ],
  [
    'CB15 a piece that runs backwards',
    'reading',
    /coilPrimaryResistance/,
    (b) => {
      Object.assign(coilWeights(b)[0]!, { from: 1.1, to: 0.9 })
    },
  ],
  [
    'CB15 a reading of another quantity',
    'reading',
    /coilPrimaryResistance/,
    (b) => {
      b.item('check', 'coilPrimaryResistance').reading!.quantity = 'dcVoltage'
    },
  ],
  [
    'CB15 a verdict that is none',
    'reading',
    /coilPrimaryResistance/,
    (b) => {
      b.item('check', 'coilPrimaryResistance').outcomes[3]!.id = 'open'
    },
  ],
  [
    'CB15 a unit that is not kept',
    'reading',
    /primaryResistance/,
    (b) => {
      b.models[0]!.specSheet!.components[0]!.values[0]!.unit = 'kohm'
    },
  ],
  [
    'CB16 a failure kind missing',
    'failureKinds',
    /fmi7/,
    (b) => {
      b.items.splice(
        b.items.findIndex((i) => i.id === 'fmi7'),
        1,
      )
    },
  ],
  [
    'CB16 a role that sets more than it can',
    'failureKinds',
    /driver/,
    (b) => {
      b.item('failure', 'fmi3').byRole!.driver = 90
    },
  ],
  [
    'CB18 two people and no way alone',
    'people',
    /sparkWhileItDies/,
    (b) => {
      b.item('check', 'sparkWhileItDies').onePersonWay = null
    },
  ],
]

test.each(BREAKS)('[%s] is found as %s', (_, kind, at, breakIt) => {
  const book = copy()
  breakIt(book)
  const found = checkBook(book.items, book.models).filter((p) => p.kind === kind)
  expect(found.map((p) => p.id).join(' ')).toMatch(at)
})

test('[CB1] every kind of finding has a book that makes it', () => {
  const broken = new Set(BREAKS.map(([, kind]) => kind))
  expect(BOOK_PROBLEMS.filter((kind) => !broken.has(kind))).toEqual([])
})

test('[CB11] a pair left together needs a reason, and a reason needs such a pair', () => {
  const stale = [{ faults: ['ignitionCoilPart', 'fuelStale'] as const, reason: 'none' }]
  expect(checkBook(BOOK_ITEMS, DEMO_MODELS, stale)).toContainEqual(
    expect.objectContaining({ kind: 'inseparable', id: 'fuelStale and ignitionCoilPart' }),
  )
})

test('[CB1] the book that is published makes no finding', () => {
  expect(checkBook(BOOK_ITEMS, DEMO_MODELS)).toEqual([])
})
