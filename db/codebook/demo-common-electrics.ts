import { component, drop, type ValueDraft, winding } from './demo-build'
import type { DemoComponent } from './demo-figures'

/** What is measured in the same way on every battery, under this model's own limits and pages. */
type Battery = {
  place: string
  setups: readonly string[]
  fasteners: string
  page: number
  restLow: number
  crankingLow: number
  /** Volts at the battery with the engine at `chargeRpm`. */
  chargeVolts: readonly [number, number]
  chargeRpm: number
}
export const battery = (b: Battery): DemoComponent =>
  component({
    id: 'batteryMain',
    name: 'Battery',
    place: b.place,
    setups: b.setups,
    fasteners: b.fasteners,
    pins: [
      ['plus', 'red', 'to starter relay and main fuse'],
      ['minus', 'black', 'to engine and frame'],
    ],
    torqueNm: 5,
    page: b.page,
    values: [
      {
        id: 'restVolts',
        name: 'Volts at rest',
        quantity: 'dcVoltage',
        low: b.restLow,
        conditions: 'Six hours at rest',
      },
      {
        id: 'crankingVolts',
        name: 'Volts while cranking',
        quantity: 'dcVoltage',
        low: b.crankingLow,
        conditions: '21 C, five seconds',
      },
      drop('postDrop', 'Volts lost over one post joint', 0.1, 'While cranking'),
      {
        id: 'chargeVolts',
        name: 'Volts at the battery, engine running',
        quantity: 'dcVoltage',
        low: b.chargeVolts[0],
        high: b.chargeVolts[1],
        conditions: `At ${b.chargeRpm} rpm, below engagement, battery charged, lights on`,
      },
      {
        id: 'loadVolts',
        name: 'Volts under load, charged',
        quantity: 'dcVoltage',
        low: b.crankingLow,
        conditions: 'Charged, 21 C, ten seconds of starter or a load of half the cold-start figure',
      },
    ],
  })

/** The engine's ground strap. */
export const engineGround = (g: { place: string; setups: readonly string[]; page: number }) =>
  component({
    id: 'engineGround',
    name: 'Engine ground',
    place: g.place,
    setups: g.setups,
    fasteners: 'One bolt, 12 mm head.',
    torqueNm: 18,
    page: g.page,
    values: [drop('groundDrop', 'Volts lost, battery minus to engine', 0.1, 'While cranking')],
  })

/** The 5 V supply, measured at a plug that can be reached. */
export const sensorSupply = (s: { place: string; setups: readonly string[]; page: number }) =>
  component({
    id: 'sensorSupply5V',
    name: '5 V supply of the sensors',
    place: s.place,
    setups: s.setups,
    page: s.page,
    values: [
      {
        id: 'volts',
        name: 'Sensor supply',
        quantity: 'dcVoltage',
        low: 4.9,
        high: 5.1,
        conditions: 'Key on, all sensors plugged in',
      },
    ],
  })

/** What a machine with a stator under the flywheel charges with. */
type Charging = {
  place: string
  regulatorPlace: string
  setups: readonly string[]
  page: number
  /** Ohms of one leg of the stator and the tolerance in percent. */
  leg: readonly [number, number]
  /** Volts between two legs, plug off, at `rpm`. */
  legAcVolts: number
  rpm: number
}
export const charging = (c: Charging): DemoComponent[] => [
  component({
    id: 'stator1',
    name: 'Stator',
    place: c.place,
    setups: c.setups,
    connector: 'White, three pins.',
    pins: [
      ['1', 'yellow', 'leg one'],
      ['2', 'yellow', 'leg two'],
      ['3', 'yellow', 'leg three'],
    ],
    page: c.page,
    values: [
      winding('legResistance', 'Leg to leg, all three pairs alike', c.leg),
      {
        id: 'legAcVolts',
        name: 'Volts leg to leg, plug off',
        quantity: 'acVoltage',
        low: c.legAcVolts,
        conditions: `At ${c.rpm} rpm, below engagement; touch nothing bare`,
      },
    ],
  }),
  component({
    id: 'regulator1',
    name: 'Regulator',
    place: c.regulatorPlace,
    setups: c.setups,
    fasteners: 'Two bolts, 10 mm head, bare metal under it.',
    pins: [
      ['1', 'red', 'battery plus'],
      ['2', 'black', 'ground'],
      ['3', 'yellow', 'three legs of the stator'],
    ],
    torqueNm: 9,
    page: c.page + 1,
    values: [
      drop('plusDrop', 'Volts lost, regulator plus to battery plus', 0.2, 'Running, lights on'),
      drop('minusDrop', 'Volts lost, regulator case to battery minus', 0.1, 'Running, lights on'),
    ],
  }),
]

/** The network pair at its service plug, with a resistor at each end. */
export const networkPair = (n: {
  place: string
  setups: readonly string[]
  page: number
  pins: readonly [string, string]
}) =>
  component({
    id: 'networkPair1',
    name: 'Network between the modules',
    place: n.place,
    setups: n.setups,
    connector: 'Black, cap on a strap.',
    pins: [
      [n.pins[0], 'yellow', 'network plus'],
      [n.pins[1], 'green', 'network minus'],
    ],
    page: n.page,
    values: [
      {
        id: 'pairResistance',
        name: 'Ohms across the pair',
        quantity: 'resistance',
        low: 55,
        high: 65,
        conditions: 'Key off for a minute, battery connected',
      },
    ],
  })

/** The current that a sleeping machine may draw. */
export const sleepCurrent = (high: number): ValueDraft => ({
  id: 'sleepCurrent',
  name: 'Current with the key off',
  quantity: 'dcCurrent',
  high,
  conditions: 'Ten minutes after key off, meter in the minus lead',
})

/** Starter relay and motor. */
export const starter = (s: {
  relayPlace: string
  motorPlace: string
  setups: readonly string[]
  page: number
}): DemoComponent[] => [
  component({
    id: 'starterRelay',
    name: 'Starter relay',
    place: s.relayPlace,
    setups: s.setups,
    fasteners: 'Push fit in its rubber; studs: 10 mm nuts.',
    connector: 'Black, two pins.',
    pins: [
      ['1', 'yellow with red', 'from the start switch'],
      ['2', 'green with yellow', 'through the interlocks to ground'],
    ],
    torqueNm: 5,
    page: s.page,
    values: [drop('contactDrop', 'Volts lost over the big studs', 0.2, 'While cranking')],
  }),
  component({
    id: 'starterMotor',
    name: 'Starter motor',
    place: s.motorPlace,
    setups: s.setups,
    fasteners: 'Two bolts, 10 mm head; stud: 10 mm nut under a cap.',
    torqueNm: 10,
    page: s.page + 1,
    values: [
      {
        id: 'crankingVolts',
        name: 'Volts at the stud while start is pressed',
        quantity: 'dcVoltage',
        low: 9.2,
        conditions: 'Battery charged, 21 C',
      },
    ],
  }),
]
