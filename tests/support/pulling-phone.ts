// A shop with everything in it, and a phone that follows its pages.
import { asShop } from '@/db/client'
import { type LogCursor, type LogPageRow, pullPage } from '@/db/queries/change-log'
import { takeChanges } from '@/db/queries/changes'
import { setJobStand } from '@/db/queries/jobs'
import { insertPartRequests } from '@/db/queries/part-requests'
import { insertPhoto } from '@/db/queries/photos'
import type { Id } from '@/lib/model/id'
import {
  AT,
  makeEntries,
  makeJob,
  makeShop,
  requestOf,
  STAND,
  type TestPerson,
  type TestShop,
} from './shop-fixture'

export const makeFullShop = () =>
  makeShop({
    mechanic: ['mechanic'],
    second: ['mechanic'],
    guide: ['guide'],
    dispatcher: ['dispatcher'],
    parts: ['parts'],
    owner: ['owner'],
  })

/** Follows the pages to the end, as a phone does, and answers what it holds then. */
export async function pullAll(
  shop: TestShop,
  {
    by,
    held = { rows: new Map(), cursor: null },
    limit = 500,
  }: { by: TestPerson; held?: Held; limit?: number },
): Promise<Held & { told: LogPageRow[] }> {
  const rows = new Map(held.rows)
  const told: LogPageRow[] = []
  let cursor = held.cursor
  for (;;) {
    const from = cursor
    const page = await asShop(shop.id, (tx) =>
      pullPage(tx, { actor: { personId: by.id }, cursor: from, limit }),
    )
    if (page.kind !== 'page') throw new Error(page.kind)
    for (const row of page.rows) {
      told.push(row)
      const key = `${row.entity} ${row.id}`
      if (row.state === 'present') rows.set(key, row.row)
      else rows.delete(key)
    }
    cursor = page.cursor
    if (!page.more) return { rows, cursor, told }
  }
}
export type Held = { rows: Map<string, unknown>; cursor: LogCursor | null }
export const entitiesOf = (held: Held) =>
  [...new Set([...held.rows.keys()].map((key) => key.split(' ')[0]))].sort()
export const has = (held: Held, entity: string, id: Id) => held.rows.has(`${entity} ${id}`)

/** A job with two entries, a part request and a photo. */
export async function makeFullJob(shop: TestShop, by: TestPerson) {
  const jobId = await makeJob(shop, by)
  const entries = await makeEntries(shop, { jobId, by, count: 2 })
  const request = requestOf(jobId)
  const hash = Array.from({ length: 64 }, () => Math.floor(Math.random() * 16).toString(16)).join(
    '',
  )
  await asShop(shop.id, async (tx) => {
    await insertPartRequests(tx, [
      { request, askedBy: by.id, askedOn: by.deviceId, receivedAt: AT },
    ])
    await insertPhoto(tx, {
      hash,
      jobId,
      bytes: 9,
      mime: 'image/jpeg',
      receivedAt: AT,
      receivedFrom: by.deviceId,
    })
    await takeChanges(tx, [
      { entity: 'partRequest', id: request.id, jobId },
      { entity: 'photo', id: hash, jobId },
    ])
  })
  const rows: [string, string][] = [
    ['job', jobId],
    ...entries.map((id): [string, string] => ['logEntry', id]),
    ['partRequest', request.id],
    ['photo', hash],
  ]
  return { jobId, rows }
}
export const heldOf = (held: Held, job: { rows: [string, string][] }) =>
  job.rows.filter(([entity, id]) => has(held, entity, id)).length

/** Changes a job and gives the whole of it new numbers. */
export const alter = (
  shop: TestShop,
  jobId: Id,
  run: (tx: Parameters<typeof takeChanges>[0]) => Promise<void>,
) =>
  asShop(shop.id, async (tx) => {
    await run(tx)
    await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
  })
export const close = (shop: TestShop, jobId: Id) =>
  alter(shop, jobId, (tx) =>
    setJobStand(tx, {
      id: jobId,
      stand: { ...STAND, state: 'closed' },
      by: { deviceId: null, at: AT },
    }),
  )
export const reopen = (shop: TestShop, jobId: Id) =>
  alter(shop, jobId, (tx) =>
    setJobStand(tx, { id: jobId, stand: STAND, by: { deviceId: null, at: AT } }),
  )
