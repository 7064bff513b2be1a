// The floor: a plain outbox in Dexie with the same durability, packed, one statement at the server.
import Dexie, { type Table } from 'dexie'
import type { BenchRecord } from '../records'
import { offer, type Task } from './arm'

class FloorDb extends Dexie {
  declare outbox: Table<{ n?: number; record: BenchRecord }, number>
  declare row: Table<BenchRecord, string>
  declare meta: Table<{ name: string; value: number }, string>

  constructor() {
    super('floor', { chromeTransactionDurability: 'strict', cache: 'disabled' })
    this.version(1).stores({ outbox: '++n', row: 'id, jobId', meta: 'name' })
  }
}

let db = new FloorDb()
let shop = ''

async function send(path: string, message: unknown): Promise<unknown> {
  const packing = new Blob([JSON.stringify(message)])
    .stream()
    .pipeThrough(new CompressionStream('gzip'))
  const answer = await fetch(path, {
    method: 'POST',
    headers: { 'content-type': 'application/json', 'content-encoding': 'gzip' },
    body: await new Response(packing).arrayBuffer(),
  })
  if (!answer.ok) throw new Error(`${path}: ${answer.status}`)
  return await answer.json()
}

function open(task: Task): void {
  db = new FloorDb()
  shop = task.actor.shopId
}

offer('floor', {
  async fill(task) {
    open(task)
    await db.transaction('rw', db.outbox, db.row, async () => {
      await db.row.bulkPut(task.records)
      await db.outbox.bulkAdd(task.records.map((record) => ({ record })))
    })
  },
  async push() {
    const waiting = await db.outbox.orderBy('n').toArray()
    await send('/api/push', { shop, records: waiting.map(({ record }) => record) })
    await db.outbox.bulkDelete(waiting.map(({ n }) => n ?? 0))
  },
  async fresh(task) {
    open(task)
    await db.open()
  },
  async pull() {
    const [held] = await db.meta.toArray()
    const seq = held?.value ?? 0
    const told = (await send('/api/pull', { shop, seq })) as {
      seq: number
      rows: { body: BenchRecord }[]
    }
    await db.transaction('rw', db.row, db.meta, async () => {
      await db.row.bulkPut(told.rows.map(({ body }) => body))
      await db.meta.put({ name: 'seq', value: told.seq })
    })
    return await db.row.count()
  },
})
