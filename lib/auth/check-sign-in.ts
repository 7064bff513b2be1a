import * as z from 'zod/mini'
import { withNoShop } from '@/db/client'
import { findSignIn } from '@/db/queries/sign-in'
import { BusyError } from './hash-slots'
import { spendCheck, verifyPassword } from './password'
import { forgetTries, giveBackTry, takeTry } from './tries'

const typed = z.object({
  email: z.string().check(z.trim(), z.toLowerCase(), z.minLength(3), z.maxLength(200)),
  password: z.string().check(z.minLength(1), z.maxLength(200)),
})

/** Whose membership the password opened; `id` is the person's. */
export type SignedIn = { id: string; shopId: string }

/**
 * Checks e-mail and password against every shop that knows the address; null when none fits. `address`:
 * where the request came from; `now`: ms since 1970. The try is counted before the password is looked at
 * (lib/auth/tries.ts). Throws `locked` when there are no tries left, and BusyError when too many wait.
 */
export async function checkSignIn(
  credentials: unknown,
  { address, now }: { address: string; now: number },
): Promise<SignedIn | null> {
  const parsed = typed.safeParse(credentials)
  if (!parsed.success) return null
  const { email, password } = parsed.data
  if (!takeTry({ email, address }, now)) throw new Error('locked')
  try {
    const found = await fittingRow(email, password)
    if (found) forgetTries({ email, address })
    return found
  } catch (problem) {
    if (problem instanceof BusyError) giveBackTry({ email, address })
    throw problem
  }
}

async function fittingRow(email: string, password: string): Promise<SignedIn | null> {
  const found = await withNoShop((tx) => findSignIn(tx, email))
  if (found.length === 0) await spendCheck(password)
  for (const row of found)
    if (await verifyPassword(password, row.passwordHash))
      return { id: row.personId, shopId: row.shopId }
  return null
}
