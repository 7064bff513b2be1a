/** The shapes of the engine's model files (engine models 2.1), before names and rows are looked at. */
import * as z from 'zod/mini'

/** More than any cost, minute or weight there is, and far from where sums of them would run over. */
const MOST = 1e12
const name = z.string().check(z.minLength(1), z.maxLength(200))
const amount = z.number().check(z.minimum(0), z.maximum(MOST))
const extra = z.number().check(z.minimum(-MOST), z.maximum(MOST))
const chance = z.number().check(z.minimum(0), z.maximum(1))
const names = z.array(name)
const repair = z.object({
  cost: amount,
  minutes: amount,
  setup: names,
  needsPart: z.optional(name),
  success: z.optional(chance),
})
/** A file of kind `single`. */
export const single = z.object({
  id: z.optional(name),
  kind: z.literal('single'),
  ratePerMinute: amount,
  faults: z
    .array(z.object({ id: name, prior: amount, repair: z.nullable(repair) }))
    .check(z.minLength(1)),
  extraRepairs: z.optional(
    z.array(
      z.object({
        id: name,
        cost: amount,
        minutes: amount,
        setup: names,
        needsPart: z.optional(name),
        fixes: z.record(name, chance),
      }),
    ),
  ),
  parts: z.optional(z.object({ onHand: names })),
  checks: z.array(
    z.object({
      id: name,
      cost: amount,
      minutes: amount,
      setup: names,
      outcomes: z.array(name).check(z.minLength(2)),
      p: z.record(name, z.array(chance)),
    }),
  ),
  setups: z.optional(
    z.array(
      z.object({
        id: name,
        cost: z.optional(amount),
        minutes: amount,
        requires: names,
        closedByTest: z.boolean(),
      }),
    ),
  ),
  verify: z.optional(
    z.object({
      cost: amount,
      minutes: amount,
      falsePass: z.optional(
        z.union(
          [chance, z.record(name, chance)],
          'must be a chance from 0 to 1, or one for each fault',
        ),
      ),
      comebackCost: z.optional(amount),
    }),
  ),
  stops: z.array(
    z.object({
      id: name,
      cost: amount,
      minutes: z.optional(amount),
      costByFault: z.optional(z.record(name, extra)),
    }),
  ),
  daylight: z.optional(z.object({ minutes: amount })),
})
/** A file of kind `noisyor`. */
export const noisyOr = z.object({
  id: z.optional(name),
  kind: z.literal('noisyor'),
  condition: z.enum(['none', 'atLeastOne']),
  faults: z.array(z.object({ id: name, prior: chance })).check(z.minLength(1)),
  findings: z.array(z.object({ id: name, leak: chance, links: z.record(name, chance) })),
  evidence: z.record(
    name,
    z.union(
      [z.literal(0), z.literal(1), z.object({ virtual: z.tuple([amount, amount]) })],
      'must be 1, 0 or { "virtual": [likelihood if absent, likelihood if present] }',
    ),
  ),
})
/** Where a job stands. */
export const state = z.object({
  evidence: z.record(name, name),
  tried: names,
  open: names,
  elapsed: amount,
})
