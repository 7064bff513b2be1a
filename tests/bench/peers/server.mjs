// node server.mjs rxdb|pouchdb <port>: the server half of a peer, on bare node:http, which is quicker than
// behind Next.js. RxDB's keeps its documents in the bench's PostgreSQL with the checks its documentation
// asks for (the assumed state against the real one), in two bulk statements; PouchDB's is express-pouchdb
// over LevelDB on disk, as shipped.
import { mkdtempSync } from 'node:fs'
import { createServer } from 'node:http'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { gunzipSync } from 'node:zlib'
import pg from 'pg'

const [kind, port] = process.argv.slice(2)
const MAKE = { rxdb, pouchdb }
const handler = await MAKE[kind]()
createServer(handler).listen(Number(port), '127.0.0.1')

async function rxdb() {
  const pool = new pg.Pool({ connectionString: process.env.PEER_DATABASE_URL, max: 10 })
  await pool.query(`create table if not exists rxdb_document (seq bigserial, shop text not null,
    id text primary key, body json not null);
    create index if not exists rxdb_document_seq on rxdb_document (shop, seq)`)
  return async (request, response) => {
    const url = new URL(request.url, 'http://peer.invalid')
    const shop = url.searchParams.get('shop')
    try {
      const told =
        url.pathname === '/push'
          ? await pushed(pool, shop, await bodyOf(request))
          : await pulled(pool, shop, url.searchParams)
      response.writeHead(200, { 'content-type': 'application/json' })
      response.end(JSON.stringify(told))
    } catch (error) {
      response.writeHead(500)
      response.end(String(error))
    }
  }
}

async function bodyOf(request) {
  const parts = []
  for await (const part of request) parts.push(part)
  const raw = Buffer.concat(parts)
  const isPacked = request.headers['content-encoding'] === 'gzip'
  return JSON.parse((isPacked ? gunzipSync(raw) : raw).toString('utf8'))
}

/** Stores what nobody changed meanwhile; answers the real state of the rest. */
async function pushed(pool, shop, rows) {
  const ids = rows.map((row) => row.newDocumentState.id)
  const { rows: held } = await pool.query(
    'select id, body from rxdb_document where id = any($1::text[])',
    [ids],
  )
  const real = new Map(held.map(({ id, body }) => [id, body]))
  const fits = ({ newDocumentState: { id }, assumedMasterState: assumed }) =>
    JSON.stringify(real.get(id)) === JSON.stringify(assumed ?? undefined)
  const good = rows.filter(fits).map((row) => row.newDocumentState)
  await pool.query(
    `insert into rxdb_document (shop, id, body)
      select $1, d.value->>'id', d.value from json_array_elements($2::json) d
      on conflict (id) do update set body = excluded.body, seq = nextval('rxdb_document_seq_seq')`,
    [shop, JSON.stringify(good)],
  )
  return rows.filter((row) => !fits(row)).map((row) => real.get(row.newDocumentState.id))
}

async function pulled(pool, shop, asked) {
  const { rows } = await pool.query(
    `select seq::int as seq, body from rxdb_document where shop = $1 and seq > $2 order by seq limit $3`,
    [shop, Number(asked.get('seq') ?? 0), Number(asked.get('limit'))],
  )
  const seq = rows.at(-1)?.seq ?? Number(asked.get('seq') ?? 0)
  return { documents: rows.map(({ body }) => body), checkpoint: { seq } }
}

function pouchdb() {
  const require = createRequire(import.meta.url)
  const express = require('express')
  const folder = mkdtempSync(join(tmpdir(), 'farbench-pouch-'))
  const PouchDB = require('pouchdb').defaults({ prefix: `${folder}/` })
  const app = express()
  const options = { mode: 'minimumForPouchDB', inMemoryConfig: true, logPath: join(folder, 'log') }
  app.use('/', require('express-pouchdb')(PouchDB, options))
  return app
}
