import { asShop } from '@/db/client'
import { publishedBook, publishedVersion, versionsByNumber } from '@/db/queries/code-book'
import type { Actor } from '@/lib/model/person'
import { problemAnswer } from './problems'

/** A version is never changed, so an address that names one may be kept for good. */
const CACHE = {
  named: 'private, max-age=31536000, immutable',
  newest: 'private, no-cache',
} as const

/** PostgreSQL's largest integer: no version is higher. */
const MAX_VERSION = 2_147_483_647

/**
 * Answers a whole published version of the actor's shop; the ETag is the version's hash. `wanted` null:
 * the newest. A version that is not there, or no number at all, is `notFound`.
 */
export async function answerBook(
  actor: Actor,
  wanted: string | null,
  ifNoneMatch: string | null,
): Promise<Response> {
  const version = wanted === null ? undefined : readVersion(wanted)
  if (version === null) return problemAnswer({ kind: 'notFound' })
  return await asShop(actor.shopId, async (tx) => {
    const head =
      version === undefined
        ? await publishedVersion(tx)
        : (await versionsByNumber(tx, [version])).at(0)
    if (!head) return problemAnswer({ kind: 'notFound' })
    const etag = `"${head.hash}"`
    const cache = version === undefined ? CACHE.newest : CACHE.named
    const headers = { etag, 'cache-control': cache, vary: 'cookie' }
    if (holds(ifNoneMatch, etag)) return new Response(null, { status: 304, headers })
    const book = await publishedBook(tx, head.version)
    const type = { 'content-type': 'application/json' }
    return new Response(JSON.stringify(book), { headers: { ...headers, ...type } })
  })
}

function readVersion(text: string): number | null {
  const version = /^[1-9]\d{0,9}$/.test(text) ? Number(text) : 0
  return version > 0 && version <= MAX_VERSION ? version : null
}

/** RFC 9110 13.1.2: a list of tags, weakly compared; a compressing server marks ours as weak. */
const holds = (ifNoneMatch: string | null, etag: string): boolean =>
  (ifNoneMatch ?? '').split(',').some((tag) => {
    const bare = tag.trim().replace(/^W\//, '')
    return bare === etag || bare === '*'
  })
