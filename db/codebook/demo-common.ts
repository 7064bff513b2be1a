import { component, drop } from './demo-build'
import type { DemoComponent } from './demo-figures'

/** What is measured in the same way on every battery, under this model's own limits and pages. */
type Battery = {
  place: string
  setups: readonly string[]
  fasteners: string
  page: number
  restLow: number
  crankingLow: number
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

/** Brake pads by the lining that must be left. */
export const brakePads = (p: { place: string; page: number; low: number; torqueNm: number }) =>
  component({
    id: 'brakePads',
    name: 'Brake pads',
    place: p.place,
    fasteners: 'Caliper: two bolts, 12 mm head.',
    torqueNm: p.torqueNm,
    page: p.page,
    values: [
      {
        id: 'liningThickness',
        name: 'Lining left on the thinnest pad',
        quantity: 'length',
        low: p.low,
        conditions: 'Measured at the thinnest place',
      },
    ],
  })

/** The drive chain by its slack. */
export const driveChain = (c: { place: string; page: number; slack: readonly [number, number] }) =>
  component({
    id: 'driveChain',
    name: 'Drive chain',
    place: c.place,
    fasteners: 'Axle nut 27 mm; adjusters 12 mm, both sides alike.',
    torqueNm: 90,
    page: c.page,
    values: [
      {
        id: 'slack',
        name: 'Slack, up and down at the middle',
        quantity: 'length',
        low: c.slack[0],
        high: c.slack[1],
        conditions: 'On its stand, wheel free, tightest place of the chain',
      },
    ],
  })

/** Oil pressure with a gauge in the switch port. */
export const engineOil = (o: { place: string; page: number; low: number }) =>
  component({
    id: 'engineOil',
    name: 'Engine oil pressure',
    place: o.place,
    fasteners: 'Switch: hexagon 24 mm, sealant on the thread.',
    torqueNm: 14,
    page: o.page,
    values: [
      {
        id: 'crankingPressure',
        name: 'Oil pressure while cranking',
        quantity: 'pressure',
        low: o.low,
        conditions: 'Plugs out, oil at the upper mark, 20 C, ten seconds',
      },
    ],
  })
