import { cookies } from 'next/headers'
import { decode } from 'next-auth/jwt'
import { lookUp } from '@/db/client'
import { liveSession } from '@/db/queries/sign-in'
import { env } from '@/lib/env'
import { type Id, id } from '@/lib/model/id'
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
    if (!value) continue
    const sid = await sessionIdOfToken(value)
    return sid === null ? null : await actorOfSession(sid)
  }
  return null
}

/** Answers the Actor of a route handler's request, read from its cookie header. */
export async function actorOfRequest(request: Request): Promise<Actor | null> {
  const sid = await sessionIdOf(request)
  return sid === null ? null : await actorOfSession(sid)
}

/** The id of the session that a request's cookie names under our signature; whether it lives is another matter. */
export function sessionIdOf(request: Request): Promise<Id | null> {
  const header = request.headers.get('cookie') ?? ''
  for (const pair of header.split(';')) {
    const at = pair.indexOf('=')
    if (COOKIE_NAMES.includes(pair.slice(0, at).trim()))
      return sessionIdOfToken(decoded(pair.slice(at + 1).trim()))
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

/** Tokens that were opened lately: opening one costs more than all else of a small request. */
const MAX_TOKENS = 1000
const tokens = new Map<string, { sid: Id; expiresMs: number }>()

/** The session that a token names; null for one that is not ours or past its time. */
async function sessionIdOfToken(token: string): Promise<Id | null> {
  const known = tokens.get(token)
  if (known !== undefined && known.expiresMs > systemClock.now()) return known.sid
  const claims = await decode({ token, secret: env().NEXTAUTH_SECRET }).catch(() => null)
  const sid = id.safeParse(claims?.sid)
  if (!sid.success) return null
  if (tokens.size >= MAX_TOKENS) tokens.delete(tokens.keys().next().value ?? '')
  tokens.set(token, { sid: sid.data, expiresMs: Number(claims?.exp ?? 0) * 1000 })
  return sid.data
}

/** The one place that turns a session into an Actor: its row and the membership are read each time. */
async function actorOfSession(sid: Id): Promise<Actor | null> {
  const now = new Date(systemClock.now()).toISOString()
  return (await lookUp((db) => liveSession(db, { id: sid, now }))) ?? null
}
