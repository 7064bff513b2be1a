import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET, POST } from '@/app/api/events/route'
import { asShop } from '@/db/client'
import { lastChange } from '@/db/queries/changes'
import { revokeSession } from '@/db/queries/sign-in'
import type { Actor } from '@/lib/model/person'
import { EventHub, eventHub, type Heard } from '@/lib/sync/server/event-hub'
import { streamEvents } from '@/lib/sync/server/event-stream'
import { type Change, EventListener } from '../support/event-listener'
import { jobOpen, logAdd, machineAdd, note } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import { openSyncWorld, phoneOf, type SyncWorld, signIn, sync } from '../support/sync-world'

let world: SyncWorld
let device: RawDevice
beforeAll(async () => {
  world = await openSyncWorld()
  device = (await phoneOf(world.a, 'mechanic')).device
})
afterAll(async () => {
  await eventHub().close()
  await world.close()
})

const caughtUp = (listener: EventListener) =>
  listener.until(() => listener.events.some((event) => event.event === 'beat'))
const openAs = async (who: string, shop = world.a) => {
  const signed = await signIn(shop, who)
  const listener = await EventListener.open(signed)
  await caughtUp(listener)
  return { listener, ...signed }
}
async function writeNotes(job: string, count: number, from = device): Promise<void> {
  const ops = Array.from({ length: count }, (_, i) => from.op(logAdd(from, job, note(`e${i}`))))
  const { taken } = await sync(from, ops)
  expect(taken).toHaveLength(count)
}
async function openJob(from = device): Promise<string> {
  const opening = jobOpen(from.owner.shopId === world.a.id ? world.a.machineId : world.b.machineId)
  await sync(from, [from.op(opening)])
  return opening.fields.id
}
const ownerOf = (shop: SyncWorld['a']): Actor => ({
  shopId: shop.id,
  personId: shop.people.owner?.id ?? '',
  roles: ['owner'],
  name: null,
})
const isStillGood = () => Promise.resolve(true)
const ascending = (changes: Change[]) =>
  changes.every((change, i) => i === 0 || change.seq > (changes[i - 1]?.seq ?? 0))

describe('GET /api/events', () => {
  it('[EV1] tells what changed in commit order and nothing of what is in it', async () => {
    const { listener } = await openAs('dispatcher')
    const job = await openJob()
    await writeNotes(job, 3)
    await listener.until(() => listener.changes.length >= 4)
    expect(listener.changes.map((change) => [change.entity, change.jobId])).toEqual([
      ['job', job],
      ['logEntry', job],
      ['logEntry', job],
      ['logEntry', job],
    ])
    expect(ascending(listener.changes)).toBe(true)
    for (const event of listener.events.filter((one) => one.event === 'change')) {
      expect(Object.keys(JSON.parse(event.data)).sort()).toEqual(['entity', 'id', 'jobId', 'seq'])
      expect(event.id).toBe((JSON.parse(event.data) as Change).seq)
    }
    listener.close()
  })

  it('[P11] tells nothing of another shop', async () => {
    const { listener } = await openAs('owner', world.b)
    const other = (await phoneOf(world.b, 'mechanic')).device
    await writeNotes(await openJob(), 5)
    const job = await openJob(other)
    await listener.until(() => listener.changes.length > 0)
    expect(listener.changes.map((change) => change.id)).toEqual([job])
    listener.close()
  })

  it('[EV1] leaves no hole and repeats nothing over reconnects during writes', async () => {
    const { listener: first, cookie } = await openAs('owner')
    const job = await openJob()
    const from = Number(first.lastId)
    let listener = first
    const heard: Change[] = []
    const writes = (async () => {
      for (let i = 0; i < 40; i++) await writeNotes(job, 3)
    })()
    for (let reconnect = 0; reconnect < 8; reconnect++) {
      const before = listener.changes.length
      await listener.until(() => listener.changes.length > before)
      listener.close()
      heard.push(...listener.changes)
      listener = await EventListener.open({ cookie, lastEventId: listener.lastId })
    }
    await writes
    const now = await asShop(world.a.id, lastChange)
    await listener.until(() => Number(listener.lastId) >= now)
    heard.push(...listener.changes)
    listener.close()
    const later = heard.filter((change) => change.seq > from)
    expect(later.map((change) => change.seq)).toEqual(
      Array.from({ length: now - from }, (_, i) => from + 1 + i),
    )
  })

  it('[EV1] loses and repeats nothing that is heard while it still catches up', async () => {
    await writeNotes(await openJob(), 2)
    const now = await asShop(world.a.id, lastChange)
    const change = (seq: number) => ({ seq, entity: 'machine', id: `m${seq}`, jobId: null })
    // Told at the worst moment: after listening began, before the log was read.
    const hub = {
      keep: () => () => undefined,
      subscribe: (_: string, heard: Heard) => {
        queueMicrotask(() => heard([change(now), change(now + 1)]))
        return Promise.resolve(() => undefined)
      },
    } as unknown as EventHub
    const listener = new EventListener()
    const actor = ownerOf(world.a)
    const signal = new AbortController().signal
    const lastEventId = String(now - 2)
    listener.read(streamEvents({ hub, actor, lastEventId, signal, isStillGood }))
    await listener.until(() => listener.changes.some((one) => one.seq === now + 1))
    expect(listener.changes.map((one) => one.seq)).toEqual([now - 1, now, now + 1])
    expect(listener.changes.at(-2)?.entity).toBe('logEntry')
  })

  it('[EV1] reads on after the line to the database broke', async () => {
    const { listener } = await openAs('owner')
    const job = await openJob()
    await sql`select pg_terminate_backend(pid) from pg_stat_activity
      where datname = current_database() and query like 'listen %'`.execute(world.db.admin)
    await writeNotes(job, 50)
    await listener.until(
      () => listener.changes.filter((change) => change.entity === 'logEntry').length === 50,
    )
    expect(ascending(listener.changes)).toBe(true)
    listener.close()
  })

  it('[EV1] [P12] asks a desk to read anew whose number is not of this log or too long ago', async () => {
    const { cookie } = await signIn(world.a, 'owner')
    for (const lastEventId of ['999999999', 'x', '-1']) {
      const listener = await EventListener.open({ cookie, lastEventId })
      await caughtUp(listener)
      expect(listener.events[0]?.event).toBe('resync')
      listener.close()
    }
  })

  it('[EV3] tells a mechanic at the desk only of rows of jobs in their hands or in nobody’s', async () => {
    const { listener } = await openAs('second')
    const job = await openJob()
    await writeNotes(job, 1)
    await asShop(world.a.id, (tx) =>
      sql`insert into job_assignment (shop_id, job_id, person_id)
      values (${world.a.id}, ${job}, ${device.owner.personId})`
        .execute(tx)
        .then(() =>
          sql`
      select take_changes(${world.a.id}, ${JSON.stringify([{ entity: 'job', id: job, jobId: job, whole: true }])}::jsonb)`.execute(
            tx,
          ),
        ),
    )
    await writeNotes(job, 4)
    const free = device.op(machineAdd())
    await sync(device, [free])
    await listener.until(() => listener.changes.some((change) => change.id === free.entityId))
    const entries = listener.changes.filter(
      (change) => change.entity === 'logEntry' && change.jobId === job,
    )
    expect(entries.length).toBeLessThanOrEqual(1)
    listener.close()
  })

  it('[R22] refuses who has no session or no desk, and every other method', async () => {
    expect((await GET(new Request('http://shop.invalid/api/events'))).status).toBe(401)
    await expect(openAs('guide')).rejects.toThrow('403')
    expect(POST().status).toBe(405)
  })

  it('[EV2] [R22] ends the stream of a revoked session at the next beat', async () => {
    const { cookie, sessionId } = await signIn(world.a, 'owner')
    const request = new Request('http://shop.invalid/api/events', { headers: { cookie } })
    const { actorOfRequest } = await import('@/lib/auth/actor')
    const actor = await actorOfRequest(request)
    if (!actor) throw new Error('no session')
    const listener = new EventListener()
    const isStillGood = async () => (await actorOfRequest(request)) !== null
    listener.read(
      streamEvents({
        hub: eventHub(),
        actor,
        lastEventId: null,
        signal: request.signal,
        isStillGood,
        beatMs: 50,
      }),
    )
    await listener.until(() => listener.events.length >= 3)
    await asShop(world.a.id, (tx) =>
      revokeSession(tx, { id: sessionId, now: new Date().toISOString() }),
    )
    await listener.until(() => listener.ended)
    expect(listener.events.every((event) => event.event === 'beat')).toBe(true)
  })

  it('[EV2] lets a reader go who does not read, and forgets those who left', async () => {
    const hub = eventHub()
    const before = hub.size
    const actor = ownerOf(world.a)
    const signal = new AbortController().signal
    const stalled = streamEvents({
      hub,
      actor,
      lastEventId: null,
      signal,
      isStillGood,
    })
    expect(hub.size).toBe(before + 1)
    const { listener } = await openAs('owner')
    const job = await openJob()
    // Nobody reads `stalled`: about 150 bytes for each change, and it is let go past 256 kB.
    for (let i = 0; i < 5; i++) await writeNotes(job, 500)
    await listener.until(() => listener.changes.length >= 2501)
    expect(hub.size).toBe(before + 1)
    expect(stalled.body?.locked).toBe(false)
    listener.close()
    await listener.until(() => hub.size === before)
    expect(hub.size).toBe(before)
  })

  it('[EV2] ends every stream when the process is told to stop', async () => {
    const hub = new EventHub()
    const actor = ownerOf(world.a)
    const listeners = Array.from({ length: 5 }, () => {
      const listener = new EventListener()
      const signal = new AbortController().signal
      listener.read(
        streamEvents({
          hub,
          actor,
          lastEventId: null,
          signal,
          isStillGood,
        }),
      )
      return listener
    })
    await Promise.all(listeners.map(caughtUp))
    await hub.close()
    await Promise.all(listeners.map((listener) => listener.until(() => listener.ended)))
    expect(hub.size).toBe(0)
  })
})
