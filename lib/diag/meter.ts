import type { Bag } from '@/lib/model/bag'
import type { SpecValue } from '@/lib/model/machine-model'
import type { MeterProfile, Quantity } from '@/lib/model/meter-profile'
import type { ReadingInput } from './reading'

/** How a meter stands for a reading: leads nulled or not, and both temperatures in C, null when not said (R7). */
export type MeterStands = { nulled: boolean; partTempC: number | null; meterTempC: number | null }

/** A reading before there is a value: what the meter adds to its budget and the figure that judges it. */
export type MeterInput = Omit<ReadingInput, 'value' | 'overRange'>

/** The input of a reading with this meter; null when there is no meter or it cannot read the quantity. */
export function meterInput(
  meter: MeterProfile | null,
  { nulled, partTempC, meterTempC }: MeterStands,
  { quantity, spec }: { quantity: Quantity; spec: SpecValue | null },
): MeterInput | null {
  const meterFunction = meter?.functions[quantity]
  if (meter === null || meterFunction === undefined) return null
  return {
    quantity,
    meterFunction,
    leadsOhm: meter.leadsOhm,
    nulled,
    partTempC,
    meterTempC,
    perKelvin: meter.perKelvin,
    spec,
  }
}

/**
 * The meter a job is reckoned with until another is picked: the first of the bag that the shop still has, else
 * the only one the shop has. Null while the shop's meters are not known, and when there are several to pick from.
 */
export function meterAtHand(
  meters: readonly MeterProfile[] | undefined,
  bag: Pick<Bag, 'meterIds'> | null | undefined,
): MeterProfile | null {
  if (meters === undefined) return null
  const carried = bag?.meterIds.map((id) => meters.find((meter) => meter.id === id))
  return (
    carried?.find((meter) => meter !== undefined) ??
    (meters.length === 1 ? (meters[0] ?? null) : null)
  )
}
