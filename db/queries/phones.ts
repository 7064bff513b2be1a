import { sql } from 'kysely'
import { type Id, sha256Hex } from '@/lib/model/id'
import { logEntry } from '@/lib/model/log-entry'
import type { DeskPhone, DeskPhones, Quarantined } from '@/lib/model/phones'
import { asShop, type ShopTx } from '../client'
import { deviceGaps } from './devices'
import { FILE_KIND, listQuarantine, type QuarantineItem } from './quarantine'

/** Answers the shop's phones with what they left in quarantine, those with something to decide first. */
export function readPhones(shopId: Id): Promise<DeskPhones> {
  return asShop(shopId, async (tx) => {
    const items = await listQuarantine(tx)
    const told = await itemsToTell(tx, items)
    const rows = await phoneRows(tx)
    const phones: DeskPhone[] = []
    for (const row of rows) {
      const missing = row.gapsToldAt === null ? 0 : await countGaps(tx, row.id)
      const own = told.filter(({ deviceId }) => deviceId === row.id).map(({ item }) => item)
      phones.push({ ...phoneOf(row), missing, items: own })
    }
    return { phones: phones.toSorted((a, b) => waiting(b) - waiting(a)) }
  })
}

const waiting = (phone: DeskPhone) => phone.items.filter((item) => item.decision === null).length

const countGaps = async (tx: ShopTx, id: Id) =>
  (await deviceGaps(tx, id)).reduce((sum, gap) => sum + gap.last - gap.first + 1, 0)

const phoneRows = (tx: ShopTx) =>
  tx
    .selectFrom('device as d')
    .leftJoin('personContact as c', (join) =>
      join.onRef('c.shopId', '=', 'd.shopId').onRef('c.personId', '=', 'd.personId'),
    )
    .leftJoin('membership as m', (join) =>
      join.onRef('m.shopId', '=', 'd.shopId').onRef('m.personId', '=', 'd.personId'),
    )
    .selectAll('d')
    .select(['c.name as personName', sql<boolean>`m.revoked_at is null`.as('isMember')])
    .where('d.shopId', '=', tx.shopId)
    // A person's desk is a device under the person's own id, and no phone.
    .whereRef('d.id', '!=', 'd.personId')
    .orderBy('d.lastSeenAt', (order) => order.desc().nullsLast())
    .orderBy('d.id')
    .execute()

type PhoneRow = Awaited<ReturnType<typeof phoneRows>>[number]

const phoneOf = (row: PhoneRow): Omit<DeskPhone, 'missing' | 'items'> => ({
  id: row.id,
  words: row.name,
  person: { id: row.personId, name: row.personName, isMember: row.isMember },
  enrolledAt: row.enrolledAt,
  lastSeenAt: row.lastSeenAt,
  clockOffsetMs: row.clockOffsetMs,
  held: heldOf(row),
  bookVersion: row.bookVersion,
  revoked: row.revokedAt === null ? null : { at: row.revokedAt, reason: row.revokedReason },
  wipeToldAt: row.wipeToldAt,
  gone: goneOf(row),
})

const heldOf = ({ heldOps, heldPhotos, heldOldestAt, heldToldAt }: PhoneRow) =>
  heldToldAt === null
    ? null
    : { ops: heldOps ?? 0, photos: heldPhotos ?? 0, oldestAt: heldOldestAt, toldAt: heldToldAt }

const goneOf = ({ replacedAt, lostOps, deletedOps, lostLastOn }: PhoneRow) =>
  replacedAt === null
    ? null
    : { at: replacedAt, lostOps: lostOps ?? 0, deletedOps: deletedOps ?? 0, lastOn: lostLastOn }

type Told = { deviceId: Id; item: Quarantined }

/** Every item but the files that are decided with the op that names them. */
async function itemsToTell(tx: ShopTx, items: readonly QuarantineItem[]): Promise<Told[]> {
  const named = new Set(items.flatMap((item) => (item.kind === FILE_KIND ? [] : item.fileHash)))
  const here = new Set(items.flatMap((item) => (item.kind === FILE_KIND ? item.fileHash : [])))
  const jobs = await jobWords(tx, [...new Set(items.flatMap((item) => item.jobId ?? []))])
  return items
    .filter((item) => item.kind !== FILE_KIND || !named.has(item.fileHash))
    .map((item) => ({
      deviceId: item.deviceId,
      item: itemOf(item, { here, words: jobs.get(item.jobId ?? '') ?? null }),
    }))
}

function itemOf(
  item: QuarantineItem,
  { here, words }: { here: ReadonlySet<string | null>; words: string | null },
): Quarantined {
  const { opId, kind, dseq, jobId, receivedAt, why, decision, reason, decidedAt } = item
  const hash = sha256Hex.safeParse(item.fileHash)
  return {
    opId,
    kind,
    dseq,
    jobId,
    jobWords: words,
    ...readRaw(item),
    receivedAt,
    why,
    file: hash.success ? { hash: hash.data, here: here.has(hash.data) } : null,
    decision,
    reason,
    decidedAt,
  }
}

/** What the op says of itself: when it was recorded, and the entry it carries. */
function readRaw({ raw, kind }: QuarantineItem): Pick<Quarantined, 'recordedAt' | 'entry'> {
  const op = JSON.parse(raw) as { hlc?: unknown; fields?: unknown } | null
  const stamp = /^([0-9a-f]{12})-/.exec(String(op?.hlc ?? ''))?.[1]
  const ms = stamp === undefined ? Number.NaN : Number.parseInt(stamp, 16)
  const recordedAt = ms <= LAST_MS ? new Date(ms).toISOString() : null
  const entry = kind === 'log.add' ? logEntry.safeParse(op?.fields) : undefined
  return { recordedAt, entry: entry?.success === true ? entry.data : null }
}

const LAST_MS = Date.UTC(9999, 0)

async function jobWords(tx: ShopTx, ids: readonly Id[]): Promise<Map<Id, string>> {
  if (ids.length === 0) return new Map()
  const rows = await tx
    .selectFrom('job')
    .select(['id', 'number', 'complaint'])
    .where('shopId', '=', tx.shopId)
    .where('id', '=', sql<string>`any(${ids}::uuid[])`)
    .execute()
  return new Map(rows.map(({ id, number, complaint }) => [id, `${number}, ${complaint.words}`]))
}
