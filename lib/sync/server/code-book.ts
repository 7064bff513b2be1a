import { asShop, type ShopTx } from '@/db/client'
import {
  type BookVersion,
  contentByHash,
  itemsOfVersion,
  publishedBook,
  publishedVersion,
  versionByHash,
  versionsByNumber,
} from '@/db/queries/code-book'
import { listWithdrawals } from '@/db/queries/code-book-withdrawal'
import { holdsIn } from '@/lib/diag/withdrawn-in'
import type { Actor } from '@/lib/model/person'
import {
  type BookManifest,
  type BookNotices,
  type BookPatch,
  itemKey,
} from '@/lib/sync/protocol/book'
import { changesBetween, withContents } from './book/make-patch'
import { problemAnswer } from './problems'

/** A version is never changed, so an address that names one may be kept for good. */
const CACHE = {
  named: 'private, max-age=31536000, immutable',
  newest: 'private, no-cache',
} as const

/** PostgreSQL's largest integer: no version is higher. */
const MAX_VERSION = 2_147_483_647

/**
 * What is asked: which version (`version`; null: the newest), from which hash on (`from`: only what changed
 * since the version that the phone holds), its list of hashes (`as=manifest`), or what was withdrawn
 * (`as=notices`), which no tag holds for.
 */
export type BookWanted = { version: string | null; from: string | null; as: string | null }

/** Reads the question out of an address. */
export const bookWanted = (url: string): BookWanted => {
  const { searchParams: asked } = new URL(url)
  return { version: asked.get('version'), from: asked.get('from'), as: asked.get('as') }
}

/**
 * Answers a published version of the actor's shop: whole, as what changed since another, or as its list of
 * hashes. The ETag is the version's hash. A version that is not there, or no number at all, is `notFound`;
 * a `from` that the shop does not know is answered with the whole version.
 */
export async function answerBook(
  actor: Actor,
  wanted: BookWanted,
  ifNoneMatch: string | null,
): Promise<Response> {
  const version = wanted.version === null ? undefined : readVersion(wanted.version)
  if (version === null) return problemAnswer({ kind: 'notFound' })
  return await asShop(actor.shopId, async (tx) => {
    if (wanted.as === 'notices') return Response.json(await noticesOf(tx), { headers: NEVER_KEPT })
    const head =
      version === undefined
        ? await publishedVersion(tx)
        : (await versionsByNumber(tx, [version])).at(0)
    if (!head) return problemAnswer({ kind: 'notFound' })
    const etag = `"${head.hash}"`
    const cache = version === undefined ? CACHE.newest : CACHE.named
    const headers = { etag, 'cache-control': cache, vary: 'cookie' }
    if (holds(ifNoneMatch, etag)) return new Response(null, { status: 304, headers })
    const type = { 'content-type': 'application/json' }
    const body = await bodyOf(tx, head, wanted)
    return new Response(JSON.stringify(body), { headers: { ...headers, ...type } })
  })
}

async function bodyOf(tx: ShopTx, head: BookVersion, { from, as }: BookWanted): Promise<unknown> {
  if (as === 'manifest') return await manifestOf(tx, head)
  const base = from === null ? undefined : await versionByHash(tx, from)
  if (base !== undefined) return await patchOf(tx, base, head)
  return await publishedBook(tx, head.version)
}

async function patchOf(tx: ShopTx, base: BookVersion, head: BookVersion): Promise<BookPatch> {
  const [before, after] = [
    await itemsOfVersion(tx, base.version),
    await itemsOfVersion(tx, head.version),
  ]
  const { drop, put, move } = changesBetween(before, after)
  const contents = await contentByHash(
    tx,
    put.map(([, hash]) => hash),
  )
  const { version, hash, publishedAt } = head
  return {
    version,
    hash,
    publishedAt,
    from: base.hash,
    drop,
    put: withContents(put, contents),
    move,
  }
}

const NEVER_KEPT = { 'cache-control': 'no-store' }

async function noticesOf(tx: ShopTx): Promise<BookNotices> {
  const newest = await publishedVersion(tx)
  return { newest: newest?.version ?? null, withdrawals: await listWithdrawals(tx) }
}

async function manifestOf(tx: ShopTx, head: BookVersion): Promise<BookManifest> {
  const placed = await itemsOfVersion(tx, head.version)
  const items = placed.map(({ kind, itemId, hash }) => [itemKey({ kind, id: itemId }), hash])
  const { version, hash, publishedAt } = head
  const withdrawals = (await listWithdrawals(tx)).filter((one) => holdsIn(one, version))
  return { version, hash, publishedAt, items: Object.fromEntries(items), withdrawals }
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
