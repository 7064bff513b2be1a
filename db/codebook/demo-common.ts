import { component } from './demo-build'

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

/** Tyres by their pressure. */
export const tyres = (t: { place: string; page: number; kPa: readonly [number, number] }) =>
  component({
    id: 'tyres',
    name: 'Tyres',
    place: t.place,
    page: t.page,
    values: [
      {
        id: 'coldPressure',
        name: 'Pressure, tyres cold',
        quantity: 'pressure',
        low: t.kPa[0],
        high: t.kPa[1],
        conditions: 'Cold, machine unloaded, gauge for low pressure',
      },
    ],
  })
