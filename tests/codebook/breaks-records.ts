import type { Break } from './broken-book'

/** Books broken in one record: shape, ids, sources, orphans, rows. */
export const RECORD_BREAKS: Break[] = [
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
    'CB3 a code that tells of a fault that is not there',
    'unresolved',
    /pcodeP0301/,
    (b) => {
      const { tells } = b.item('pcode', 'pcodeP0301')
      if (tells) tells.of100.sparkPlgBad = 30
    },
  ],
  [
    'CB22 a fault that sets a code less often than none does',
    'order',
    /pcodeP0301/,
    (b) => {
      const { tells } = b.item('pcode', 'pcodeP0301')
      if (tells) tells.of100.sparkPlugBad = 1
    },
  ],
  [
    'CB22 a code whose figures tell nothing',
    'tellsNothing',
    /spn1323/,
    (b) => {
      const { tells } = b.item('spn', 'spn1323')
      if (tells) tells.of100 = { sparkPlugBad: tells.otherwise }
    },
  ],
  [
    'CB22 one story with two sets of figures',
    'order',
    /^spn1323$/,
    (b) => {
      const { tells } = b.item('spn', 'spn1323')
      if (tells) tells.otherwise = 1
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
    'CB8 a check that tells only in too close to call',
    'tellsNothing',
    /coilPrimaryResistance/,
    (b) => {
      const check = b.item('check', 'coilPrimaryResistance')
      check.table.ignitionCoilPart = [50, 48, 1, 1]
      check.otherwise = [70, 28, 1, 1]
    },
  ],
]
