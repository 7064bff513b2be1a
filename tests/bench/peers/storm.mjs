// node storm.mjs <base> <file>: PouchDB devices of one storm, as the file lists them, in one process with
// memory stores. Prints when each was done, in ms since all began at once.
import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'

const require = createRequire(import.meta.url)
const PouchDB = require('pouchdb')
PouchDB.plugin(require('pouchdb-adapter-memory'))

const [base, file] = process.argv.slice(2)
const devices = await Promise.all(
  JSON.parse(readFileSync(file, 'utf8')).map(async ({ shop, records }, index) => {
    const local = new PouchDB(`device${index}`, { adapter: 'memory' })
    const remote = new PouchDB(`${base}/bench${shop.replaceAll('-', '')}`)
    await local.bulkDocs(records.map(({ id, ...rest }) => ({ _id: id, ...rest })))
    await remote.info()
    return { local, remote }
  }),
)
const began = performance.now()
const eachMs = await Promise.all(
  devices.map(async ({ local, remote }) => {
    const done = await local.replicate.to(remote, { batch_size: 500 })
    if (!done.ok || done.doc_write_failures > 0) throw new Error('not replicated')
    return performance.now() - began
  }),
)
process.stdout.write(JSON.stringify({ wholeMs: performance.now() - began, eachMs }))
process.exit(0)
