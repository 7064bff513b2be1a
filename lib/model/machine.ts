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

/** What a machine is called by; of a model of the shop's its maker and model, else as typed. */
type Called = Partial<
  Record<'unitNumber' | 'makerTyped' | 'modelTyped' | 'maker' | 'model', string | null>
>

/** Unit, maker and model in words: `Unit 14, Tarnholt Moor 450`. */
export function machineWords(called: Called): string {
  const made = [called.maker ?? called.makerTyped, called.model ?? called.modelTyped]
  const unit = called.unitNumber ? `Unit ${called.unitNumber}` : ''
  return (
    [unit, made.filter(Boolean).join(' ')].filter(Boolean).join(', ') || 'Machine without a name'
  )
}
