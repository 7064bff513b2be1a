import * as z from 'zod/mini'
import { id } from './id'
import { role } from './role'

/** A person as others of the shop see them. The name lives in its own table so that it can be erased. */
export const person = z.strictObject({
  id,
  name: z.nullable(z.string().check(z.maxLength(120))),
  roles: z.array(role),
})
export type Person = z.infer<typeof person>

/** Who is at work: the shop, the person and the set of roles. Everything on the server starts from one. */
export const actor = z.strictObject({
  shopId: id,
  personId: id,
  roles: z.array(role),
  name: z.nullable(z.string()),
})
export type Actor = z.infer<typeof actor>
