import * as z from 'zod/mini'
import { features } from './features'
import { slug } from './id'
import { quantity } from './meter-profile'
import { sentence, source } from './sentence'

/** A value with limits on a model's spec sheet (rule R18). Limits win over nominal and tolerance. */
export const specValue = z.strictObject({
  id: slug,
  name: z.string(),
  quantity,
  unit: z.string(),
  nominal: z.nullable(z.number()),
  tolerancePercent: z.nullable(z.number()),
  low: z.nullable(z.number()),
  high: z.nullable(z.number()),
  partTempC: z.nullable(z.number()),
  material: z.nullable(z.enum(['copper', 'ntc'])),
  conditions: z.nullable(z.string()),
  source,
})
export type SpecValue = z.infer<typeof specValue>

export const specSheet = z.strictObject({
  showCodes: z.strictObject({ steps: z.array(sentence), clearSteps: z.array(sentence), source }),
  components: z.array(
    z.strictObject({
      id: slug,
      name: z.string(),
      place: sentence,
      setups: z.array(slug),
      fasteners: z.nullable(sentence),
      connector: z.nullable(sentence),
      pins: z.array(z.strictObject({ pin: z.string(), colour: z.string(), carries: z.string() })),
      torqueNm: z.nullable(z.number()),
      values: z.array(specValue),
      source,
    }),
  ),
  cutOut: z.nullable(z.enum(['opensToStop', 'closesToStop'])),
  engagementRpm: z.nullable(z.number()),
  massKg: z.nullable(z.number()),
  towPreparation: z.nullable(sentence),
  /** Which part the shop buys for each part word, and what it costs (invented in the demo). */
  parts: z.array(
    z.strictObject({
      part: slug,
      genuineNumber: z.string(),
      genuineMinor: z.int(),
      aftermarketNumber: z.nullable(z.string()),
      aftermarketMinor: z.nullable(z.int()),
      genuineFailsOf100: z.number(),
      aftermarketFailsOf100: z.nullable(z.number()),
      source,
    }),
  ),
  demo: z.boolean(),
})
export type SpecSheet = z.infer<typeof specSheet>

/** A machine model of the shop with its features and spec sheet. Maker and model are as typed. */
export const machineModel = z.strictObject({
  id: z.uuid(),
  maker: z.string(),
  model: z.string(),
  features,
  specSheet: z.nullable(specSheet),
  source,
})
export type MachineModel = z.infer<typeof machineModel>
