import { randomBytes } from 'node:crypto'
import { gzipSync } from 'node:zlib'
import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import * as devicesRoute from '@/app/api/devices/route'
import * as syncRoute from '@/app/api/sync/route'
import { asShop } from '@/db/client'
import { listDevices } from '@/db/queries/devices'
import { listLog } from '@/db/queries/log-entries'
import { revokeSession } from '@/db/queries/sign-in'
import { HEADERS } from '@/lib/sync/protocol/device'
import { PROTOCOL } from '@/lib/sync/protocol/message'
import { OP_SCHEMA } from '@/lib/sync/protocol/op'
import { jobOpen, logAdd, note } from '../support/field-ops'
import { RawDevice } from '../support/raw-device'
import {
  enrolAt,
  openSyncWorld,
  phoneOf,
  problemOf,
  type SyncWorld,
  signIn,
  sync,
} from '../support/sync-world'

let world: SyncWorld
let device: RawDevice
let cookie: string
let job: string
beforeAll(async () => {
  world = await openSyncWorld()
  const phone = await phoneOf(world.a, 'mechanic')
  device = phone.device
  cookie = phone.cookie
  const opening = jobOpen(world.a.machineId)
  await sync(device, [device.op(opening)])
  job = opening.fields.id
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
const entries = async () => (await inA((tx) => listLog(tx, job))).length
const entry = (from = device) => from.op(logAdd(from, job, note('word')))
const refusal = async (request: Request) => problemOf(await syncRoute.POST(request))
/** The same request with some headers changed or, for null, left out. */
function twisted(request: Request, changes: Record<string, string | null>): Request {
  const headers = new Headers(request.headers)
  for (const [name, value] of Object.entries(changes)) {
    if (value === null) headers.delete(name)
    else headers.set(name, value)
  }
  return new Request(request, { headers })
}

describe('POST /api/sync, who may', () => {
  it('[P18] refuses a forged, a missing and a cut signature, and a body that was changed', async () => {
    const before = await entries()
    const forger = new RawDevice(device.owner)
    forger.id = device.id
    const flipped = Buffer.from(await device.push([entry()]).arrayBuffer())
    const honest = device.signature(flipped, '1-1')
    flipped[flipped.length - 5] = (flipped[flipped.length - 5] ?? 0) ^ 1
    const attempts = [
      forger.push([entry()]),
      twisted(device.push([entry()]), { [HEADERS.signature]: null }),
      twisted(device.push([entry()]), {
        [HEADERS.signature]: randomBytes(64).toString('base64url'),
      }),
      twisted(device.push([entry()]), { [HEADERS.signature]: 'short' }),
      twisted(device.push([entry()]), { [HEADERS.dseq]: '1-999' }),
      new Request('http://shop.invalid/api/sync', {
        method: 'POST',
        body: flipped,
        headers: honest,
      }),
    ]
    for (const attempt of attempts) {
      expect(await refusal(attempt)).toMatchObject({
        status: 401,
        kind: 'badSignature',
        type: 'application/problem+json',
      })
    }
    expect(await entries()).toBe(before)
  })

  it('[P18] does not know a key under another person, another shop or another device', async () => {
    const before = await entries()
    const second = world.a.people.second?.id ?? ''
    const foreign = { shopId: world.b.id, personId: device.owner.personId }
    const body = gzipSync('{}')
    const as = (owner: { shopId: string; personId: string }) =>
      new Request('http://shop.invalid/api/sync', {
        method: 'POST',
        body,
        headers: device.signature(body, '-', owner),
      })
    expect(await refusal(as({ shopId: world.a.id, personId: second }))).toMatchObject({
      status: 401,
      kind: 'unknownDevice',
    })
    expect(await refusal(as(foreign))).toMatchObject({ status: 401, kind: 'unknownDevice' })
    expect(await refusal(as({ shopId: v7(), personId: second }))).toMatchObject({
      status: 401,
      kind: 'unknownDevice',
    })
    const stranger = await refusal(new RawDevice(device.owner).push([entry()]))
    expect(stranger).toMatchObject({ status: 401, kind: 'unknownDevice' })
    expect(stranger.title).toMatch(/sign in and enrol/)
    expect(await entries()).toBe(before)
  })

  it('[P18] takes a push with an expired, a revoked and no session, and asks to sign in for the pull', async () => {
    const expired = await signIn(world.a, 'mechanic', -1)
    const revoked = await signIn(world.a, 'mechanic')
    await inA((tx) => revokeSession(tx, { id: revoked.sessionId, now: new Date().toISOString() }))
    const forged = `${cookie.slice(0, -4)}AAAA`
    for (const its of [
      expired.cookie,
      revoked.cookie,
      forged,
      'next-auth.session-token=%E0%A4%A',
      null,
    ]) {
      const op = entry()
      const answer = await sync(device, [op], { cookie: its, pull: true })
      expect(answer).toMatchObject({ taken: [op.id], pull: { kind: 'signIn' } })
    }
  })

  it('[P18] pulls nothing for a phone while somebody else is signed in on it', async () => {
    const other = await signIn(world.a, 'owner')
    const stranger = await signIn(world.b, 'owner')
    for (const { cookie: its } of [other, stranger]) {
      const op = entry()
      expect(await sync(device, [op], { cookie: its })).toMatchObject({
        taken: [op.id],
        pull: { kind: 'signIn' },
      })
    }
    expect((await sync(device, [], { cookie })).pull.kind).toBe('page')
  })
})

describe('POST /api/sync, what it takes', () => {
  it('[P14] answers a zip bomb with 413 and takes nothing of it', async () => {
    const bomb = gzipSync(Buffer.alloc(64 * 1024 * 1024))
    expect(await refusal(device.send(bomb))).toMatchObject({ status: 413, kind: 'tooLarge' })
  })

  it('[P14] answers 413 past 512 kB as sent and past 500 ops', async () => {
    expect(await refusal(device.send(randomBytes(512 * 1024 + 1)))).toMatchObject({ status: 413 })
    const many = Array.from({ length: 501 }, () => entry())
    expect(await refusal(device.push(many))).toMatchObject({ status: 413, kind: 'tooLarge' })
  })

  it('[P14] answers 400 to a cut body that was signed so, and to what is no message', async () => {
    const whole = gzipSync(JSON.stringify({ protocol: PROTOCOL }))
    expect(await refusal(device.send(whole.subarray(0, 20)))).toMatchObject({
      status: 400,
      kind: 'badGzip',
    })
    for (const text of [
      '[]',
      'null',
      '"x"',
      '{"protocol":1}',
      '<html></html>',
      '{"protocol":1,"ops":{}}',
    ]) {
      expect(await refusal(device.send(gzipSync(text)))).toMatchObject({
        status: 400,
        kind: 'badJson',
      })
    }
  })

  it('[P13] keeps the work of an old app and asks for the update, and lets a new one wait', async () => {
    expect(await refusal(device.push([entry()], { protocol: PROTOCOL - 2 }))).toMatchObject({
      status: 426,
      kind: 'tooOld',
    })
    const wait = await syncRoute.POST(device.push([entry()], { protocol: PROTOCOL + 1 }))
    expect(wait.status).toBe(503)
    expect(Number(wait.headers.get('retry-after'))).toBeGreaterThan(0)
    const later = { ...entry(), schema: OP_SCHEMA + 1 }
    expect(await sync(device, [later])).toMatchObject({
      taken: [],
      results: [{ opId: later.id, result: 'retry' }],
    })
  })

  it('[P17] answers every refusal in application/problem+json with a sentence, never in HTML', async () => {
    const requests = [
      device.send(Buffer.from('x')),
      device.push([], { protocol: -3 }),
      new RawDevice(device.owner).push([]),
    ]
    for (const request of requests) {
      const said = await refusal(request)
      expect(said).toMatchObject({ type: 'application/problem+json' })
      expect(said.title).toMatch(/^[A-Z].*\.$/)
    }
  })

  it('[P3] takes no other method', () => {
    for (const refuse of [syncRoute.GET, syncRoute.PUT, syncRoute.PATCH, syncRoute.DELETE]) {
      const answer = refuse()
      expect(answer.status).toBe(405)
      expect(answer.headers.get('allow')).toBe('POST')
    }
  })

  it('[P16] slows one phone that hammers and no other', async () => {
    const { device: hammer } = await phoneOf(world.a, 'second')
    const answers = await Promise.all(
      Array.from({ length: 250 }, () => syncRoute.POST(hammer.push([]))),
    )
    const slowed = answers.filter((answer) => answer.status === 429)
    expect(slowed.length).toBe(10)
    expect(Number(slowed[0]?.headers.get('retry-after'))).toBeGreaterThan(0)
    expect((await syncRoute.POST(device.push([]))).status).toBe(200)
  })
})

describe('POST /api/devices', () => {
  it('[P18] answers the same phone for the same key, also to two tabs at once', async () => {
    const { cookie: its } = await signIn(world.a, 'guide')
    const phone = new RawDevice({ shopId: world.a.id, personId: world.a.people.guide?.id ?? '' })
    const answers = await Promise.all(
      [v7(), v7(), v7()].map(async (deviceId) => (await enrolAt(phone, its, { deviceId })).json()),
    )
    const ids = new Set(answers.map((answer) => (answer as { deviceId: string }).deviceId))
    expect(ids.size).toBe(1)
    const stored = await inA((tx) => listDevices(tx))
    expect(stored.filter((row) => row.publicKey.x === phone.publicKey.x)).toHaveLength(1)
  })

  it('[P18] gives a second key another id when the phone asks for a taken one', async () => {
    const other = new RawDevice(device.owner)
    const answer = await enrolAt(other, cookie, { deviceId: device.id })
    const { deviceId } = (await answer.json()) as { deviceId: string }
    expect(deviceId).not.toBe(device.id)
    other.id = deviceId
    expect((await syncRoute.POST(other.push([]))).status).toBe(200)
    expect((await syncRoute.POST(device.push([]))).status).toBe(200)
    // A person's own id is kept for their desk (R22).
    const { personId } = device.owner
    const asked = await enrolAt(new RawDevice(device.owner), cookie, { deviceId: personId })
    expect(await asked.json()).not.toMatchObject({ deviceId: personId })
  })

  it('[P18] enrols nobody without a session, without the field, or with a point off the curve', async () => {
    expect((await enrolAt(new RawDevice(device.owner), null)).status).toBe(401)
    const { cookie: parts } = await signIn(world.a, 'parts')
    expect((await enrolAt(new RawDevice(device.owner), parts)).status).toBe(403)
    const off = { kty: 'EC', crv: 'P-256', x: device.publicKey.x, y: device.publicKey.x }
    expect((await enrolAt(new RawDevice(device.owner), cookie, { publicKey: off })).status).toBe(
      422,
    )
    expect(
      (await enrolAt(new RawDevice(device.owner), cookie, { words: 'x'.repeat(9000) })).status,
    ).toBe(413)
    expect((await enrolAt(new RawDevice(device.owner), cookie, { deviceId: 'mine' })).status).toBe(
      400,
    )
    expect(devicesRoute.GET().status).toBe(405)
  })
})
