import * as z from 'zod/mini'
import { features } from './features'
import { id } from './id'
import { alsoEntered } from './setting'

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

/** As it comes back from the shop. */
export const machineRow = z.object({
  ...machine.shape,
  /** The machine that stands for this one, after a merge (R13). */
  mergedInto: z.optional(id),
  /** It was taken back and written into meanwhile, so it stands again. */
  revived: z.optional(z.boolean()),
  /** On the phone alone: taken back there, and the shop has not said so yet. */
  takenBack: z.optional(z.boolean()),
  /** Values that did not stand and that nobody has looked at, the latest first. */
  alsoEntered: z.optional(z.array(alsoEntered)),
})
export type MachineRow = z.infer<typeof machineRow>
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
