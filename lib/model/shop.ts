import * as z from 'zod/mini'
import { id } from './id'

/** The shop's own settings that the field needs; each figure is the shop's, with who set it in the audit trail. */
export const shop = z.object({
  id,
  name: z.string(),
  zone: z.string(),
  currency: z.string(),
  /** Price of a mechanic's minute, of a tow and of a second recovery, in minor units. */
  perMinuteMinor: z.int(),
  towMinor: z.int(),
  recoveryMinor: z.int(),
  emergencyNumber: z.string(),
  phone: z.string(),
})
export type Shop = z.infer<typeof shop>
