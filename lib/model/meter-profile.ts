import * as z from 'zod/mini'
import { id } from './id'

/** Quantities a meter can read, each with the one unit it is kept in (SI or the trade's accepted unit). */
export const QUANTITIES = {
  resistance: 'ohm',
  dcVoltage: 'V',
  acVoltage: 'V',
  dcCurrent: 'A',
  pressure: 'kPa',
  flow: 'L/min',
  temperature: 'degC',
  length: 'mm',
  time: 's',
} as const
export type Quantity = keyof typeof QUANTITIES
export const quantity = z.enum(Object.keys(QUANTITIES) as [Quantity, ...Quantity[]])

/** One function of a meter: half-width = percent/100 * |reading| + digits * resolution, in the quantity's unit. */
export const meterFunction = z.strictObject({
  percent: z.number().check(z.minimum(0), z.maximum(50)),
  digits: z.int().check(z.minimum(0), z.maximum(200)),
  resolution: z.number().check(z.positive()),
})

/** A meter with its leads. `leadsOhm` is the range two leads and their contacts add to a resistance. */
export const meterProfile = z.strictObject({
  id,
  name: z.string().check(z.minLength(1), z.maxLength(80)),
  functions: z.partialRecord(quantity, meterFunction),
  leadsOhm: z.strictObject({
    low: z.number().check(z.minimum(0)),
    high: z.number().check(z.minimum(0)),
  }),
  /** Widening per kelvin outside 18 to 28 C, as a share of the accuracy (rule R7; typical data sheet, from memory). */
  perKelvin: z.number().check(z.minimum(0)),
  source: z.string().check(z.minLength(1)),
})
export type MeterProfile = z.infer<typeof meterProfile>
