import type { SpecValue } from '@/lib/model/machine-model'
import { QUANTITIES } from '@/lib/model/meter-profile'
import { type DemoComponent, type DemoPart, NO_LIMITS, page, SHOP_FIGURE } from './demo-figures'

/** A value as it is written down; left out means: that limit is not known. */
export type ValueDraft = Pick<SpecValue, 'id' | 'name' | 'quantity'> &
  Partial<Omit<SpecValue, 'id' | 'name' | 'quantity' | 'unit' | 'source'>>

/** A component as it is written down; left out means: nothing to open, no plug, no torque known, nothing to measure. */
type ComponentDraft = Pick<DemoComponent, 'id' | 'name' | 'place'> & {
  /** Page of the demo manual for the component and its values. */
  page: number
  setups?: readonly string[]
  fasteners?: string
  connector?: string
  pins?: readonly (readonly [pin: string, colour: string, carries: string])[]
  torqueNm?: number
  values?: readonly ValueDraft[]
}

/** The whole record of a component; every figure says its page and that it is invented. */
export const component = (draft: ComponentDraft): DemoComponent => ({
  id: draft.id,
  name: draft.name,
  place: draft.place,
  setups: [...(draft.setups ?? [])],
  fasteners: draft.fasteners ?? null,
  connector: draft.connector ?? null,
  pins: (draft.pins ?? []).map(([pin, colour, carries]) => ({ pin, colour, carries })),
  torqueNm: draft.torqueNm ?? null,
  values: (draft.values ?? []).map((value) => ({
    ...NO_LIMITS,
    ...value,
    unit: QUANTITIES[value.quantity],
    source: page(draft.page),
  })),
  source: page(draft.page),
})

/** A copper winding at 20 C, measured at its own pins. */
export const winding = (
  id: string,
  name: string,
  [nominal, tolerancePercent]: readonly [number, number],
): ValueDraft => ({
  id,
  name,
  quantity: 'resistance',
  nominal,
  tolerancePercent,
  partTempC: 20,
  material: 'copper',
  conditions: 'Unplugged and at 20 C',
})

/** Volts lost over a joint or a length of wire: at most so many, under these conditions. */
export const drop = (id: string, name: string, high: number, conditions: string): ValueDraft => ({
  id,
  name,
  quantity: 'dcVoltage',
  high,
  conditions,
})

type Prices = readonly [number: string, minor: number, failsOf100: number]
type PartRow = readonly [part: string, genuine: Prices, aftermarket?: Prices]

/** Parts of the demo shop from their rows: the number, the price, and of 100 how many failed within a year. */
export const demoParts = (rows: readonly PartRow[]): DemoPart[] =>
  rows.map(([part, genuine, other]) => ({
    part,
    genuineNumber: genuine[0],
    genuineMinor: genuine[1],
    aftermarketNumber: other?.[0] ?? null,
    aftermarketMinor: other?.[1] ?? null,
    genuineFailsOf100: genuine[2],
    aftermarketFailsOf100: other?.[2] ?? null,
    source: SHOP_FIGURE,
  }))
