// Two shops with every role, on a database of their own, and the real route handlers in front of it.
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { encode } from 'next-auth/jwt'
import { v7 } from 'uuid'
import { POST as postDevice } from '@/app/api/devices/route'
import { POST as postSync } from '@/app/api/sync/route'
import { asShop } from '@/db/client'
import { insertSession } from '@/db/queries/sign-in'
import type { Role } from '@/lib/model/role'
import { type SyncResponse, syncResponse } from '@/lib/sync/protocol/message'
import { startFiles } from '../../scripts/fakes/files.mjs'
import { openTestDatabase, type TestDatabase } from './database'
import { type PushOptions, RawDevice } from './raw-device'
import { makeShop, type TestShop } from './shop-fixture'

const SECRET = 'a secret of the tests, thirty-two characters and more'
export const ROLE_PEOPLE: Record<string, Role[]> = {
  mechanic: ['mechanic'],
  second: ['mechanic'],
  guide: ['guide'],
  dispatcher: ['dispatcher'],
  parts: ['parts'],
  owner: ['owner'],
  both: ['mechanic', 'parts'],
}

export type SyncWorld = {
  db: TestDatabase
  a: TestShop
  b: TestShop
  /** Where the local file store keeps its objects, and where uploads are staged. */
  filesDir: string
  stageDir: string
  files: { url: string; stop(): Promise<void> }
  close(): Promise<void>
}

/**
 * Opens the world; close it in afterAll. Settings of the process are set for the handlers. `openDatabase`:
 * another one than a copy on the project's own PostgreSQL.
 */
export async function openSyncWorld(
  openDatabase: () => Promise<TestDatabase> = openTestDatabase,
): Promise<SyncWorld> {
  const db = await openDatabase()
  const filesDir = mkdtempSync(join(tmpdir(), 'farbench-files-'))
  const stageDir = mkdtempSync(join(tmpdir(), 'farbench-stage-'))
  const files = await startFiles({
    port: 0,
    folder: filesDir,
    bucket: 'test',
    key: 'test-key',
    secret: 'test-secret',
  })
  Object.assign(process.env, {
    DATABASE_URL: db.appUrl,
    NEXTAUTH_SECRET: SECRET,
    NEXTAUTH_URL: 'http://127.0.0.1:3111',
    MAIL_URL: 'smtp://127.0.0.1:1',
    FILES_URL: files.url,
    FILES_BUCKET: 'test',
    FILES_KEY: 'test-key',
    FILES_SECRET: 'test-secret',
    FILES_STAGE: stageDir,
  })
  const a = await makeShop(ROLE_PEOPLE)
  const b = await makeShop(ROLE_PEOPLE)
  const close = async () => {
    await db.close()
    await files.stop()
    rmSync(filesDir, { recursive: true, force: true })
    rmSync(stageDir, { recursive: true, force: true })
  }
  return { db, a, b, filesDir, stageDir, files, close }
}

export type SignedIn = { cookie: string; sessionId: string }

/** A session of that person as the sign-in would make it. */
export async function signIn(shop: TestShop, who: string, livesMs = 3_600_000): Promise<SignedIn> {
  const sessionId = v7()
  const personId = shop.people[who]?.id ?? ''
  const now = Date.now()
  await asShop(shop.id, (tx) =>
    insertSession(tx, {
      id: sessionId,
      personId,
      createdAt: new Date(now - 1000).toISOString(),
      expiresAt: new Date(now + livesMs).toISOString(),
    }),
  )
  const token = await encode({
    secret: SECRET,
    maxAge: 3600,
    token: { sub: personId, sid: sessionId },
  })
  return { cookie: `next-auth.session-token=${token}`, sessionId }
}

/** A phone of that person, enrolled through the route, and its session's cookie. */
export async function phoneOf(shop: TestShop, who: string) {
  const { cookie, sessionId } = await signIn(shop, who)
  const device = new RawDevice({ shopId: shop.id, personId: shop.people[who]?.id ?? '' })
  const answer = await enrolAt(device, cookie)
  if (answer.status !== 200) throw new Error(`not enrolled: ${answer.status}`)
  return { device, cookie, sessionId }
}

/** POST /api/devices for this device. */
export function enrolAt(device: RawDevice, cookie: string | null, changes: object = {}) {
  const body = { deviceId: device.id, publicKey: device.publicKey, words: 'Test phone', ...changes }
  const request = new Request('http://shop.invalid/api/devices', {
    method: 'POST',
    body: JSON.stringify(body),
    headers: cookie ? { cookie } : {},
  })
  return postDevice(request)
}

/** Sends a request to POST /api/sync and answers the checked message. Fails for a problem. */
export async function exchangeOf(request: Request): Promise<SyncResponse> {
  const answer = await postSync(request)
  if (answer.status !== 200) throw new Error(`${answer.status}: ${await answer.text()}`)
  return syncResponse.parse(await answer.json())
}

/** Pushes ops and pulls with the cookie, if any; moves the device's cursor on. */
export async function sync(device: RawDevice, ops: unknown[], options: PushOptions = {}) {
  const answer = await exchangeOf(device.push(ops, options))
  if (answer.pull.kind === 'page' || answer.pull.kind === 'reset')
    device.cursor = answer.pull.cursor
  return answer
}

/** Pulls until there is no more; answers every row in the order it came. */
export async function pullAll(device: RawDevice, cookie: string) {
  const rows = []
  for (;;) {
    const { pull } = await sync(device, [], { cookie })
    if (pull.kind === 'reset') continue
    if (pull.kind !== 'page') throw new Error(`pull answered ${pull.kind}`)
    rows.push(...pull.rows)
    if (!pull.more) return rows
  }
}

export const problemOf = async (answer: Response) => ({
  ...((await answer.json()) as { kind: string; title: string }),
  status: answer.status,
  type: answer.headers.get('content-type'),
})
