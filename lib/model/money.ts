import * as z from 'zod/mini'

/** Money: integer minor units (cents) and an ISO 4217 code. Never a float. */
export const money = z.strictObject({
  minor: z.int(),
  currency: z.string().check(z.regex(/^[A-Z]{3}$/)),
})
export type Money = z.infer<typeof money>
