// The peers' own client libraries in the bench's page: RxDB with its Dexie storage and its replication
// protocol over HTTP, PouchDB with IndexedDB. Batches of 500, the most that suits either.
import PouchDB from 'pouchdb'
import { createRxDatabase } from 'rxdb/plugins/core'
import { replicateRxCollection } from 'rxdb/plugins/replication'
import { getRxStorageDexie } from 'rxdb/plugins/storage-dexie'

const BATCH = 500
const text = { type: 'string' }
const schema = {
  version: 0,
  primaryKey: 'id',
  type: 'object',
  properties: {
    id: { type: 'string', maxLength: 36 },
    jobId: text,
    happenedAt: text,
    authorId: text,
    body: { type: 'object', properties: { kind: text, words: text } },
  },
}

let collection
let shop

async function openRx(task) {
  shop = task.actor.shopId
  const db = await createRxDatabase({ name: 'bench', storage: getRxStorageDexie() })
  collection = (await db.addCollections({ record: { schema } })).record
}

async function told(path, init) {
  const answer = await fetch(path, init)
  if (!answer.ok) throw new Error(`${path}: ${answer.status}`)
  return await answer.json()
}

const push = {
  batchSize: BATCH,
  handler: (rows) =>
    told(`/push?shop=${shop}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(rows),
    }),
}
const pull = {
  batchSize: BATCH,
  handler: (from, limit) => told(`/pull?shop=${shop}&limit=${limit}&seq=${from?.seq ?? 0}`),
}

async function replicated(way) {
  const run = replicateRxCollection({
    collection,
    replicationIdentifier: 'bench',
    live: false,
    waitForLeadership: false,
    ...way,
  })
  const failed = new Promise((_, reject) => run.error$.subscribe(reject))
  await Promise.race([run.awaitInitialReplication(), failed])
}

const rxdb = {
  async fill(task) {
    await openRx(task)
    const { error } = await collection.bulkInsert(task.records)
    if (error.length > 0) throw new Error(JSON.stringify(error[0]))
  },
  push: () => replicated({ push }),
  fresh: openRx,
  async pull() {
    await replicated({ pull })
    return await collection.count().exec()
  },
}

let local
let remote

async function openPouch(task) {
  local = new PouchDB('bench', { adapter: 'idb' })
  remote = new PouchDB(`${location.origin}/bench${task.actor.shopId.replaceAll('-', '')}`)
  await local.info()
  await remote.info()
}

function checked({ ok, errors, doc_write_failures: failures }) {
  if (!ok || errors.length > 0 || failures > 0) throw new Error('not replicated')
}

const pouchdb = {
  async fill(task) {
    await openPouch(task)
    const docs = task.records.map(({ id, ...rest }) => ({ _id: id, ...rest }))
    await local.bulkDocs(docs)
  },
  push: async () => checked(await local.replicate.to(remote, { batch_size: BATCH })),
  fresh: openPouch,
  async pull() {
    checked(await local.replicate.from(remote, { batch_size: BATCH }))
    return (await local.info()).doc_count
  },
}

globalThis.benchArms = { ...globalThis.benchArms, rxdb, pouchdb }
