import * as z from 'zod/mini'

/** A UUID made where the row is made: version 7 (RFC 9562) for everything new, so that ids sort by time. */
export const id = z.uuid()
export type Id = z.infer<typeof id>

/** A word of the code book: lower camel case, stable for ever, e.g. `ignitionCoil`. */
export const slug = z.string().check(z.regex(/^[a-z][A-Za-z0-9]{0,63}$/))

/** SHA-256 of some bytes in lower-case hex (64 characters). */
export const sha256Hex = z.string().check(z.regex(/^[0-9a-f]{64}$/))
