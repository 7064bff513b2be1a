import * as z from 'zod/mini'
import { features } from './features'
import { id } from './id'

/** A machine: one of the fleet (with a model) or a stranger's (features only). */
export const machine = z.strictObject({
  id,
  modelId: z.nullable(id),
  unitNumber: z.nullable(z.string().check(z.maxLength(20))),
  makerTyped: z.nullable(z.string().check(z.maxLength(60))),
  modelTyped: z.nullable(z.string().check(z.maxLength(60))),
  year: z.nullable(z.int().check(z.minimum(1950), z.maximum(2100))),
  serial: z.nullable(z.string().check(z.maxLength(30))),
  hours: z.nullable(z.number().check(z.minimum(0))),
  features,
  fleet: z.boolean(),
})
export type Machine = z.infer<typeof machine>
