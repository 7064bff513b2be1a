// What must hold on a phone that was killed and started cold, and at the shop once it has sent.
import type { Kept } from './page/kill-page'
import { type Ask, same } from './shop-proof'
import { broken } from './tally'
import { draftOf, type Save, type Trip } from './trip'

/** P1: each save is there whole or not at all, and what was told as kept is there. True for those that are. */
export function holdWhole(kept: Kept, trip: Trip): boolean[] {
  const ops = new Set(kept.outbox.map((record) => record.opId))
  const rows = new Set(kept.rows.map((row) => row.key))
  return trip.saves.map((save) => {
    const found = [
      ...save.ids.map((id) => ops.has(id)),
      ...save.rows.map((key) => rows.has(key)),
      ...(save.photo === null ? [] : [kept.photos.some(({ hash }) => hash === save.photo?.hash)]),
    ]
    const isKept = found.every(Boolean)
    if (!isKept && found.some(Boolean)) broken('P1', `torn: ${JSON.stringify({ found, save })}`)
    if (save.told && !isKept) broken('P1', `lost: ${save.ids}`)
    holdDraft(kept, trip, save, isKept)
    return isKept
  })
}

/** A draft goes with the save that ends it, and not before. */
function holdDraft(kept: Kept, trip: Trip, save: Save, isKept: boolean): void {
  const value = kept.drafts[save.draft]
  const isThere = value === draftOf(save)
  if (isKept ? value !== null : trip.drafted && !isThere)
    broken(
      'R8',
      `draft ${save.draft} is ${JSON.stringify(value)}, its save ${isKept ? 'kept' : 'not kept'}`,
    )
}

/** P2: numbers without a hole; P8: rows and cursor stand together; PH4: bytes stay until they are confirmed. */
export async function holdStore(ask: Ask, shopId: string, kept: Kept): Promise<void> {
  const numbers = Array.from({ length: kept.stamped }, (_, n) => n + 1)
  same(
    'P2',
    'op numbers of the phone',
    numbers,
    kept.outbox.map((record) => record.dseq),
  )
  const whole = kept.photos.filter((photo) => photo.state !== 'sent').map((photo) => photo.hash)
  same('PH4', 'photos with their bytes', whole, kept.photoBytes)
  const ahead = kept.rows.filter((row) => (row.seq ?? 0) > kept.cursor)
  if (ahead.length > 0) broken('P8', `${ahead[0]?.key} is ahead of the cursor ${kept.cursor}`)
  const held = new Map(kept.rows.map((row) => [row.key, row.seq ?? 0]))
  const changes = await ask<{ key: string; seq: number }>(
    `select entity || '/' || entity_id as key, max(seq)::int as seq from change_log
     where shop_id = $1 and entity = any($2) group by 1 having max(seq) <= $3`,
    [shopId, ['job', 'machine', 'logEntry', 'partRequest'], kept.cursor],
  )
  const missed = changes.filter(({ key, seq }) => (held.get(key) ?? 0) < seq)
  if (missed.length > 0) broken('P8', `the cursor ${kept.cursor} passed ${missed[0]?.key}`)
}

/** Once it has sent: what was kept is at the shop once, and nothing else of this phone is. */
export async function holdArrived(
  ask: Ask,
  shopId: string,
  of: { deviceId: string; kept: Kept; saves: readonly Save[]; lines: readonly string[] },
): Promise<void> {
  const { deviceId, kept, saves } = of
  const ops = await ask<{ op_id: string; outcome: string }>(
    'select op_id, outcome from sync_op where shop_id = $1 and device_id = $2',
    [shopId, deviceId],
  )
  same(
    'P4',
    'ops at the shop',
    kept.outbox.map((record) => record.opId),
    ops.map((op) => op.op_id),
  )
  const refused = ops.filter((op) => op.outcome !== 'accepted')
  if (refused.length > 0) broken('P5', `refused: ${JSON.stringify(refused[0])}`)
  const entries = await ask<{ id: string }>(
    'select id from log_entry where shop_id = $1 and device_id = $2',
    [shopId, deviceId],
  )
  const written = saves.flatMap((save) => save.rows).filter((key) => key.startsWith('logEntry/'))
  same(
    'P4',
    'entries at the shop',
    written,
    entries.map(({ id }) => `logEntry/${id}`),
  )
  const photos = await ask<{ hash: string }>('select hash from photo where shop_id = $1', [shopId])
  const taken = saves.flatMap((save) => save.photo?.hash ?? [])
  same(
    'PH2',
    'photos at the shop',
    taken,
    photos.map((photo) => photo.hash),
  )
  const lines = await ask<{ id: string; counted: number }>(
    'select id, coalesce(wanted, quantity)::int as counted from part_line where shop_id = $1',
    [shopId],
  )
  // One was asked for and one more counted on top.
  same(
    'P4',
    'pieces',
    of.lines.map((id) => `${id} 2`),
    lines.map((line) => `${line.id} ${line.counted}`),
  )
  if (kept.photoBytes.length > 0) broken('PH4', 'bytes of a confirmed photo are still there')
}
