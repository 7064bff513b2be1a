// A file store for the demo and the tests that speaks S3 on loopback: one bucket, path style, signature
// version 4 checked whole, PutObject, GetObject (with Range), HeadObject and DeleteObject. Objects lie
// as plain files under the folder; nothing leaves the machine. Port: FILES_PORT, 9009.
import { createHash, createHmac, randomBytes, timingSafeEqual } from 'node:crypto'
import { createReadStream, mkdirSync } from 'node:fs'
import { mkdir, open, readFile, rename, rm, stat } from 'node:fs/promises'
import { createServer } from 'node:http'
import { dirname, join, resolve } from 'node:path'
import { pipeline } from 'node:stream/promises'
import { fileURLToPath } from 'node:url'

const root = resolve(fileURLToPath(new URL('../..', import.meta.url)))
const MAX_BYTES = 16 * 1024 * 1024
const SKEW_MS = 15 * 60_000
const SAFE_KEY = /^[A-Za-z0-9][A-Za-z0-9._-]*(\/[A-Za-z0-9][A-Za-z0-9._-]*)*$/
const AUTHORIZATION =
  /^AWS4-HMAC-SHA256 Credential=([^/]+)\/(\d{8})\/([^/]+)\/s3\/aws4_request,\s*SignedHeaders=([a-z0-9;-]+),\s*Signature=([0-9a-f]{64})$/

class Refusal extends Error {
  constructor(status, code) {
    super(code)
    this.status = status
    this.code = code
  }
}

const sha256 = (bytes) => createHash('sha256').update(bytes).digest('hex')
const hmac = (key, text) => createHmac('sha256', key).update(text).digest()

/** `20261124T184000Z` in ms since 1970. */
const stampMs = (stamp) =>
  Date.parse(stamp.replace(/^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/, '$1-$2-$3T$4:$5:$6Z'))

function canonicalQuery(search) {
  const pairs = search.split('&').filter((pair) => pair !== '')
  return pairs
    .map((pair) => (pair.includes('=') ? pair : `${pair}=`))
    .sort()
    .join('&')
}

/** The signature this request must carry (AWS Signature Version 4, header form). */
function wantedSignature(request, { secret, day, region, signed }) {
  const [path, search = ''] = request.url.split('?')
  const headers = signed.map(
    (name) =>
      `${name}:${String(request.headers[name] ?? '')
        .trim()
        .replace(/ +/g, ' ')}\n`,
  )
  const canonical = [
    request.method,
    path,
    canonicalQuery(search),
    headers.join(''),
    signed.join(';'),
    request.headers['x-amz-content-sha256'],
  ].join('\n')
  const scope = `${day}/${region}/s3/aws4_request`
  const text = ['AWS4-HMAC-SHA256', request.headers['x-amz-date'], scope, sha256(canonical)]
  const key = [day, region, 's3', 'aws4_request'].reduce(hmac, `AWS4${secret}`)
  return hmac(key, text.join('\n'))
}

/** Throws unless the request is signed by the one key this store knows. */
function checkSignature(request, { key, secret }) {
  const match = AUTHORIZATION.exec(request.headers.authorization ?? '')
  if (!match) throw new Refusal(403, 'AccessDenied')
  const [, id, day, region, names, signature] = match
  if (id !== key) throw new Refusal(403, 'InvalidAccessKeyId')
  const stamp = String(request.headers['x-amz-date'] ?? '')
  const signed = names.split(';')
  if (!signed.includes('host') || !stamp.startsWith(day)) throw new Refusal(403, 'AccessDenied')
  if (!(Math.abs(Date.now() - stampMs(stamp)) < SKEW_MS))
    throw new Refusal(403, 'RequestTimeTooSkewed')
  const wanted = wantedSignature(request, { secret, day, region, signed })
  if (!timingSafeEqual(wanted, Buffer.from(signature, 'hex')))
    throw new Refusal(403, 'SignatureDoesNotMatch')
}

async function bodyOf(request) {
  const parts = []
  let bytes = 0
  for await (const part of request) {
    bytes += part.length
    if (bytes > MAX_BYTES) throw new Refusal(400, 'EntityTooLarge')
    parts.push(part)
  }
  const body = Buffer.concat(parts)
  const said = request.headers['x-amz-content-sha256']
  if (said !== 'UNSIGNED-PAYLOAD' && said !== sha256(body))
    throw new Refusal(400, 'XAmzContentSHA256Mismatch')
  return body
}

/** Written beside its place, brought to the disk, then moved: never half a file. */
async function keep(path, bytes) {
  await mkdir(dirname(path), { recursive: true, mode: 0o700 })
  const beside = `${path}.${randomBytes(6).toString('hex')}.part`
  try {
    const file = await open(beside, 'wx', 0o600)
    try {
      await file.writeFile(bytes)
      await file.sync()
    } finally {
      await file.close()
    }
    await rename(beside, path)
  } catch (problem) {
    await rm(beside, { force: true })
    throw problem
  }
}

/** First and last byte asked for; null for the whole, throws for what lies outside. */
function rangeOf(header, size) {
  if (header === undefined) return null
  const match = /^bytes=(\d*)-(\d*)$/.exec(header)
  if (!match || (match[1] === '' && match[2] === '')) return null
  const first = match[1] === '' ? Math.max(0, size - Number(match[2])) : Number(match[1])
  const last = match[1] === '' || match[2] === '' ? size - 1 : Math.min(Number(match[2]), size - 1)
  if (first > last) throw new Refusal(416, 'InvalidRange')
  return { first, last }
}

async function found(path) {
  try {
    const about = await stat(path)
    if (about.isFile()) return about
  } catch (problem) {
    if (problem.code !== 'ENOENT' && problem.code !== 'ENOTDIR') throw problem
  }
  throw new Refusal(404, 'NoSuchKey')
}

async function show(request, response, place) {
  const about = await found(place.path)
  const range = rangeOf(request.headers.range, about.size)
  const type = await readFile(place.type, 'utf8').catch(() => 'application/octet-stream')
  const headers = {
    'content-type': type,
    'accept-ranges': 'bytes',
    'last-modified': about.mtime.toUTCString(),
    etag: `"${about.mtimeMs.toString(16)}-${about.size.toString(16)}"`,
    'content-length': range ? range.last - range.first + 1 : about.size,
    ...(range ? { 'content-range': `bytes ${range.first}-${range.last}/${about.size}` } : {}),
  }
  response.writeHead(range ? 206 : 200, headers)
  if (request.method === 'HEAD') response.end()
  else {
    const parts = range ? { start: range.first, end: range.last } : {}
    // Closes the file too when the client breaks off.
    await pipeline(createReadStream(place.path, parts), response).catch(() => response.destroy())
  }
}

async function answer(request, response, how) {
  checkSignature(request, how)
  const path = decodeURIComponent(request.url.split('?')[0])
  const [, bucket, ...rest] = path.split('/')
  const key = rest.join('/')
  if (bucket !== how.bucket) throw new Refusal(404, 'NoSuchBucket')
  if (!SAFE_KEY.test(key)) throw new Refusal(400, 'InvalidURI')
  const place = { path: join(how.folder, key), type: join(how.folder, '.types', key) }
  switch (request.method) {
    case 'PUT': {
      const bytes = await bodyOf(request)
      await keep(place.type, request.headers['content-type'] ?? 'application/octet-stream')
      await keep(place.path, bytes)
      response.writeHead(200, { etag: `"${createHash('md5').update(bytes).digest('hex')}"` }).end()
      return
    }
    case 'GET':
    case 'HEAD':
      await show(request, response, place)
      return
    case 'DELETE':
      await rm(place.path, { force: true })
      await rm(place.type, { force: true })
      response.writeHead(204).end()
      return
    default:
      throw new Refusal(405, 'MethodNotAllowed')
  }
}

function refuse(request, response, problem) {
  const { status, code } =
    problem instanceof Refusal ? problem : { status: 500, code: 'InternalError' }
  if (response.headersSent) {
    response.destroy()
    return
  }
  const text = `<?xml version="1.0" encoding="UTF-8"?><Error><Code>${code}</Code></Error>`
  response.writeHead(status, { 'content-type': 'application/xml', connection: 'close' })
  response.end(request.method === 'HEAD' ? '' : text)
}

/** Starts the store; answers its port, its address and how to stop it. Objects lie under `folder`. */
export function startFiles({ port, folder, bucket, key, secret }) {
  mkdirSync(folder, { recursive: true, mode: 0o700 })
  const how = { folder, bucket, key, secret }
  const server = createServer((request, response) => {
    answer(request, response, how).catch((problem) => refuse(request, response, problem))
  })
  return new Promise((started, failed) => {
    server.once('error', failed)
    server.listen(port, '127.0.0.1', () => {
      server.off('error', failed)
      const taken = server.address().port
      started({
        port: taken,
        url: `http://127.0.0.1:${taken}`,
        stop: () =>
          new Promise((stopped) => {
            server.close(stopped)
            server.closeAllConnections()
          }),
      })
    })
  })
}

if (process.argv[1] && resolve(process.argv[1]) === fileURLToPath(import.meta.url)) {
  const files = await startFiles({
    port: Number(process.env.FILES_PORT ?? 9009),
    folder: process.env.FILES_FOLDER ?? join(root, '.data', 'files'),
    bucket: process.env.FILES_BUCKET ?? 'farbench',
    key: process.env.FILES_KEY ?? '',
    secret: process.env.FILES_SECRET ?? '',
  })
  console.log(`files on 127.0.0.1:${files.port}`)
  for (const signal of ['SIGINT', 'SIGTERM'])
    process.once(signal, async () => {
      await files.stop()
      process.exit(0)
    })
}
