import * as z from 'zod/mini'

/** An instant in UTC, RFC 3339 with milliseconds and Z, e.g. `2026-11-24T18:40:00.000Z`. */
export const instant = z.iso.datetime({ precision: 3 })
export type Instant = z.infer<typeof instant>

/** IANA time zone in which the instant was lived, e.g. `Etc/GMT+6`. Shown times use it; sums never do. */
export const zone = z.string().check(z.minLength(1), z.maxLength(64))
