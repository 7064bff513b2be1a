import * as z from 'zod/mini'
import { sha256Hex } from './id'

/** A trouble code as the dash shows it (rule R11): never corrected, never guessed. */
export const codeSeen = z.discriminatedUnion('format', [
  z.strictObject({
    format: z.literal('spn'),
    spn: z.int().check(z.minimum(0), z.maximum(524287)),
    fmi: z.int().check(z.minimum(0), z.maximum(31)),
  }),
  z.strictObject({
    format: z.literal('pcode'),
    code: z.string().check(z.regex(/^[PCBU][0-3][0-9A-F]{3}$/)),
  }),
  z.strictObject({
    format: z.literal('flash'),
    pattern: z.string().check(z.regex(/^\d{1,2}(-\d{1,2}){0,4}$/)),
  }),
  z.strictObject({
    format: z.literal('asShown'),
    text: z.string().check(z.minLength(1), z.maxLength(80)),
  }),
])
export type CodeSeen = z.infer<typeof codeSeen>

/** Where and how the code stood when it was taken down. `module` is the source address or module number shown. */
export const codeContext = z.strictObject({
  module: z.nullable(z.int().check(z.minimum(0), z.maximum(255))),
  status: z.enum(['active', 'stored', 'unknown']),
  count: z.nullable(z.int().check(z.minimum(0), z.maximum(126))),
  order: z.int().check(z.minimum(1)),
  photo: z.nullable(sha256Hex),
})
export type CodeContext = z.infer<typeof codeContext>
