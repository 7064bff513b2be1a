import { cookies } from 'next/headers'
import { decode } from 'next-auth/jwt'
import { lookUp } from '@/db/client'
import { liveSession } from '@/db/queries/sign-in'
import { env } from '@/lib/env'
import { id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { systemClock } from '@/lib/ports/clock'

/** Names next-auth gives its cookie on plain http and on https. */
const COOKIE_NAMES = ['__Secure-next-auth.session-token', 'next-auth.session-token']

/** Headers that drop the session's cookie in the browser, whichever name it has. */
export const dropSession = (): [string, string][] =>
  COOKIE_NAMES.map((name) => {
    const secure = name.startsWith('__Secure-') ? '; Secure' : ''
    return ['set-cookie', `${name}=; Path=/; Max-Age=0; HttpOnly; SameSite=Lax${secure}`]
  })

/** Answers the Actor of a page's or action's own request; null: nobody, expired or revoked. */
export async function actorOf(): Promise<Actor | null> {
  const jar = await cookies()
  for (const name of COOKIE_NAMES) {
    const value = jar.get(name)?.value
    if (value) return actorOfToken(value)
  }
  return null
}

/** Answers the Actor of a route handler's request, read from its cookie header. */
export function actorOfRequest(request: Request): Promise<Actor | null> {
  const header = request.headers.get('cookie') ?? ''
  for (const pair of header.split(';')) {
    const at = pair.indexOf('=')
    if (COOKIE_NAMES.includes(pair.slice(0, at).trim()))
      return actorOfToken(decoded(pair.slice(at + 1).trim()))
  }
  return Promise.resolve(null)
}

/** A cookie's value; as it stands when it is no percent-encoding. */
function decoded(value: string): string {
  try {
    return decodeURIComponent(value)
  } catch {
    return value
  }
}

/** The one place that turns a token into an Actor: signature, session row, membership, in that order. */
async function actorOfToken(token: string): Promise<Actor | null> {
  const claims = await decode({ token, secret: env().NEXTAUTH_SECRET }).catch(() => null)
  const sid = id.safeParse(claims?.sid)
  if (!sid.success) return null
  const now = new Date(systemClock.now()).toISOString()
  return (await lookUp((db) => liveSession(db, { id: sid.data, now }))) ?? null
}
