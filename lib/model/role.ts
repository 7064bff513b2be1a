import * as z from 'zod/mini'

/** What a person may be in a shop. A membership holds a set of these. */
export const ROLES = ['mechanic', 'guide', 'dispatcher', 'parts', 'owner'] as const
export const role = z.enum(ROLES)
export type Role = z.infer<typeof role>
