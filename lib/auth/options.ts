import type { NextAuthOptions } from 'next-auth'
import Credentials from 'next-auth/providers/credentials'
import * as z from 'zod/mini'
import { asShop, withNoShop } from '@/db/client'
import { findSignIn, insertSession, revokeSession } from '@/db/queries/sign-in'
import { env } from '@/lib/env'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { spendCheck, verifyPassword } from './password'
import { countFailure, forgetFailures, mayTry } from './tries'

/** A session ends 14 days after signing in (common practice, no source); unsent work does not need one. */
const SESSION_SECONDS = 14 * 24 * 3600

const typed = z.object({
  email: z.string().check(z.trim(), z.toLowerCase(), z.minLength(3), z.maxLength(200)),
  password: z.string().check(z.minLength(1), z.maxLength(200)),
})

/** What a good sign-in hands to the token: whose session it is. */
type SignedIn = { id: string; shopId: string }

/** Checks e-mail and password against every shop that knows the address; null when none fits. */
async function checkSignIn(credentials: unknown): Promise<SignedIn | null> {
  const parsed = typed.safeParse(credentials)
  if (!parsed.success) return null
  const { email, password } = parsed.data
  const now = systemClock.now()
  if (!mayTry(email, now)) throw new Error('locked')
  const found = await withNoShop((tx) => findSignIn(tx, email))
  if (found.length === 0) await spendCheck(password)
  for (const row of found) {
    if (await verifyPassword(password, row.passwordHash)) {
      forgetFailures(email)
      return { id: row.personId, shopId: row.shopId }
    }
  }
  countFailure(email, now)
  return null
}

/**
 * next-auth's options: the cookie holds a signed token with the id of a row in `session`; the row is
 * looked up on every request (lib/auth/actor.ts), so revoking it ends every copy of the cookie.
 */
export function authOptions(): NextAuthOptions {
  return {
    secret: env().NEXTAUTH_SECRET,
    session: { strategy: 'jwt', maxAge: SESSION_SECONDS },
    pages: { signIn: '/login', error: '/login' },
    providers: [
      Credentials({
        name: 'password',
        credentials: { email: { type: 'email' }, password: { type: 'password' } },
        authorize: checkSignIn,
      }),
    ],
    callbacks: {
      async jwt({ token, user }) {
        const signedIn = user as SignedIn | undefined
        if (!signedIn) return token
        const sid = uuidv7.next()
        const now = systemClock.now()
        await asShop(signedIn.shopId, (tx) =>
          insertSession(tx, {
            id: sid,
            personId: signedIn.id,
            createdAt: new Date(now).toISOString(),
            expiresAt: new Date(now + SESSION_SECONDS * 1000).toISOString(),
          }),
        )
        return { sub: signedIn.id, shopId: signedIn.shopId, sid }
      },
    },
    events: {
      async signOut({ token }) {
        const { sid, shopId } = token as { sid?: unknown; shopId?: unknown }
        if (typeof sid === 'string' && typeof shopId === 'string')
          await asShop(shopId, (tx) =>
            revokeSession(tx, { id: sid, now: new Date(systemClock.now()).toISOString() }),
          )
      },
    },
  }
}
