// What the three floor routes share: unpack, parse, one statement.
import { createPublicKey, verify } from 'node:crypto'
import { gunzipSync } from 'node:zlib'
import pg from 'pg'

const pool = new pg.Pool({ connectionString: process.env.FLOOR_DATABASE_URL, max: 10 })

/** The message of a request, unpacked in one go, and its bytes as sent. */
export async function messageOf(request) {
  const raw = Buffer.from(await request.arrayBuffer())
  return { raw, message: JSON.parse(gunzipSync(raw).toString('utf8')) }
}

/** Runs the one statement of a request. */
export async function ask(text, values) {
  return (await pool.query(text, values)).rows
}

export const answer = (body) =>
  new Response(JSON.stringify(body), {
    headers: { 'content-type': 'application/json', 'cache-control': 'no-store' },
  })

export const PULL = `select seq::int as seq, body from floor_record
  where shop_id = $1 and seq > $2 order by seq limit 500`

const keys = new Map()

/** Whether the bytes are signed by the key of `x-floor-device`: one look-up of the key, then from memory. */
export async function isSigned(request, raw) {
  const device = request.headers.get('x-floor-device')
  if (!keys.has(device)) {
    const [row] = await ask('select jwk from floor_key where device_id = $1', [device])
    keys.set(device, createPublicKey({ key: row.jwk, format: 'jwk' }))
  }
  const signature = Buffer.from(request.headers.get('x-floor-signature'), 'base64url')
  return verify('sha256', raw, { key: keys.get(device), dsaEncoding: 'ieee-p1363' }, signature)
}
