import { createHash } from 'node:crypto'
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { type FilesAddress, s3Files } from '@/lib/ports/files'
import { startFiles } from '../../scripts/fakes/files.mjs'

let folder: string
let store: Awaited<ReturnType<typeof startFiles>>
let address: FilesAddress
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'farbench-s3-'))
  const how = { bucket: 'yard', key: 'key', secret: 'secret' }
  store = await startFiles({ port: 0, folder, ...how })
  address = { url: store.url, region: 'us-east-1', ...how }
})
afterAll(async () => {
  await store.stop()
  rmSync(folder, { recursive: true, force: true })
})

const bytes = Buffer.from(Array.from({ length: 70_000 }, (_, at) => (at * 7) % 251))
const client = () =>
  new S3Client({
    endpoint: address.url,
    region: address.region,
    forcePathStyle: true,
    credentials: { accessKeyId: address.key, secretAccessKey: address.secret },
    maxAttempts: 1,
  })
const object = (key: string) => ({ Bucket: 'yard', Key: key })

describe('the file store behind the real S3 client', () => {
  it('[PH4] keeps bytes as they are under their key, and nothing else', async () => {
    const files = s3Files(address)
    await files.put('shop-1/abc', bytes, 'image/jpeg')
    expect(readFileSync(join(folder, 'shop-1', 'abc')).equals(bytes)).toBe(true)
    expect(Buffer.from((await files.get('shop-1/abc')) ?? [])).toEqual(bytes)
    expect(await files.has('shop-1/abc')).toBe(true)
    expect(await files.get('shop-1/other')).toBeNull()
    expect(await files.has('shop-1/other')).toBe(false)
    expect(readdirSync(join(folder, 'shop-1'))).toEqual(['abc'])
  })

  it('[PH4] replaces an object whole', async () => {
    const files = s3Files(address)
    await Promise.all([1, 2, 3].map((one) => files.put('shop-1/re', Buffer.alloc(9, one), 'a/b')))
    const held = await files.get('shop-1/re')
    expect(new Set(held).size).toBe(1)
    expect(readdirSync(join(folder, 'shop-1')).filter((name) => name.endsWith('.part'))).toEqual([])
  })

  it('[PH4] refuses a key that could leave its folder', async () => {
    const files = s3Files(address)
    for (const key of ['../x/y', 'a', 'a/../b', '/etc/passwd', 'a/.b', 'a/b/c'])
      await expect(files.put(key, bytes, 'a/b')).rejects.toThrow('badFileKey')
  })

  it('[PH4] says that the store is away, to be tried again, and not that a file is missing', async () => {
    const wrong = [
      { ...address, secret: 'other' },
      { ...address, key: 'other' },
      { ...address, bucket: 'other-yard' },
      { ...address, url: 'http://127.0.0.1:1' },
    ]
    for (const at of wrong) {
      const put = s3Files(at).put('shop-1/abc', Buffer.from('x'), 'a/b')
      await expect(put).rejects.toMatchObject({ kind: 'filesAway', retry: true })
    }
    expect(Buffer.from((await s3Files(address).get('shop-1/abc')) ?? [])).toEqual(bytes)
  })

  it('[PH4] the local store speaks Range, Head with the kind, and Delete', async () => {
    const files = s3Files(address)
    await files.put('shop-1/voice', bytes, 'audio/webm')
    const head = await client().send(new HeadObjectCommand(object('shop-1/voice')))
    expect(head).toMatchObject({ ContentType: 'audio/webm', ContentLength: bytes.length })
    const read = async (range: string) => {
      const got = await client().send(
        new GetObjectCommand({ ...object('shop-1/voice'), Range: range }),
      )
      return { bytes: Buffer.from((await got.Body?.transformToByteArray()) ?? []), got }
    }
    const middle = await read('bytes=100-199')
    expect(middle.bytes.equals(bytes.subarray(100, 200))).toBe(true)
    expect(middle.got.ContentRange).toBe(`bytes 100-199/${bytes.length}`)
    expect((await read('bytes=-5')).bytes.equals(bytes.subarray(-5))).toBe(true)
    await expect(read(`bytes=${bytes.length}-`)).rejects.toMatchObject({ name: 'InvalidRange' })
    await client().send(new DeleteObjectCommand(object('shop-1/voice')))
    expect(await files.has('shop-1/voice')).toBe(false)
  })

  it('[PH4] the local store takes nothing unsigned, nothing changed on the way, nothing stale', async () => {
    const plain = await fetch(`${address.url}/yard/shop-1/abc`)
    expect([plain.status, await plain.text()]).toEqual([
      403,
      expect.stringContaining('AccessDenied'),
    ])
    let headers: Record<string, string> = {}
    const watched = client()
    watched.middlewareStack.add(
      (next) => (args) => {
        headers = { ...(args.request as { headers: Record<string, string> }).headers }
        return next(args)
      },
      { step: 'finalizeRequest', priority: 'low', name: 'watch' },
    )
    await watched.send(new HeadObjectCommand(object('shop-1/abc')))
    const signed = (changes: Record<string, string>, path = '/yard/shop-1/abc', method = 'HEAD') =>
      fetch(`${address.url}${path}`, { method, headers: { ...headers, ...changes } })
    expect((await signed({})).status).toBe(200)
    expect((await signed({}, '/yard/shop-1/re')).status).toBe(403)
    expect((await signed({}, undefined, 'DELETE')).status).toBe(403)
    expect((await signed({ 'x-amz-date': '20200101T000000Z' })).status).toBe(403)
    const hash = createHash('sha256').update('other').digest('hex')
    expect((await signed({ 'x-amz-content-sha256': hash })).status).toBe(403)
  })
})
