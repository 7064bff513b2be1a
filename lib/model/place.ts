import * as z from 'zod/mini'
import { instant } from './time'

/** Where something is: WGS84 degrees, and where the figure comes from. `asTyped` keeps what a person wrote. */
export const place = z.strictObject({
  latitude: z.number().check(z.minimum(-90), z.maximum(90)),
  longitude: z.number().check(z.minimum(-180), z.maximum(180)),
  source: z.enum(['fix', 'typed']),
  accuracyMetres: z.nullable(z.number().check(z.minimum(0))),
  at: instant,
  asTyped: z.nullable(z.string().check(z.maxLength(120))),
  words: z.nullable(z.string().check(z.maxLength(200))),
})
export type Place = z.infer<typeof place>
