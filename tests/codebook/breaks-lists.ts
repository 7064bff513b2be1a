import { type Break, coilWeights } from './broken-book'

/** Books broken as a whole: shares, reach, cautions, readings, failure kinds. */
export const LIST_BREAKS: Break[] = [
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
      b.item('check', 'coilPrimaryResistance').reading!.value = 'resistanceOfNobody'
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
