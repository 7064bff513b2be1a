import type { NextAuthOptions } from 'next-auth'
import Credentials from 'next-auth/providers/credentials'
import { asShop } from '@/db/client'
import { insertSession, revokeSession } from '@/db/queries/sign-in'
import { env } from '@/lib/env'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { checkSignIn, type SignedIn } from './check-sign-in'
import { clientAddress } from './client-address'

/** A session ends 14 days after signing in (common practice, no source); unsent work does not need one. */
const SESSION_SECONDS = 14 * 24 * 3600

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
        authorize: (credentials, request) =>
          checkSignIn(credentials, {
            address: clientAddress(request.headers?.['x-forwarded-for']),
            now: systemClock.now(),
          }),
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
