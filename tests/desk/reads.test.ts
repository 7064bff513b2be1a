import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getJob } from '@/app/api/desk/jobs/[id]/route'
import { GET as getBoard } from '@/app/api/desk/jobs/route'
import { GET as getParts } from '@/app/api/desk/parts/route'
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { assignJob, setJobStand } from '@/db/queries/jobs'
import { appendLogEntries } from '@/db/queries/log-entries'
import { insertPartRequests } from '@/db/queries/part-requests'
import { insertPhoto } from '@/db/queries/photos'
import { revokeSession } from '@/db/queries/sign-in'
import { deskBoard, deskJob, deskParts } from '@/lib/model/desk'
import { entryOf, makeJob, newId, requestOf, type TestShop } from '../support/shop-fixture'
import { openSyncWorld, problemOf, type SyncWorld, signIn } from '../support/sync-world'

let world: SyncWorld
let mine: string
let foreign: string
beforeAll(async () => {
  world = await openSyncWorld()
  mine = await makeJob(world.a, world.a.people.mechanic!)
  foreign = await makeJob(world.b, world.b.people.mechanic!)
})
afterAll(() => world.close())

const ask = async (who: string | null, path: string, shop: TestShop = world.a) => {
  const headers = who === null ? {} : { cookie: (await signIn(shop, who)).cookie }
  return new Request(`http://shop.invalid${path}`, { headers })
}
const board = async (who: string | null, query = '', shop = world.a) =>
  getBoard(await ask(who, `/api/desk/jobs${query}`, shop))
const jobAnswer = async (who: string | null, id: string, shop = world.a) =>
  getJob(await ask(who, `/api/desk/jobs/${id}`, shop), { params: Promise.resolve({ id }) })
const parts = async (who: string | null) => getParts(await ask(who, '/api/desk/parts'))

describe('who may read the desk', () => {
  it.each([
    ['dispatcher', 200],
    ['parts', 200],
    ['owner', 200],
    ['both', 200],
    ['mechanic', 403],
    ['guide', 403],
  ])('[R22] the whole board: %s %i', async (who, status) => {
    const answer = await board(who)
    expect(answer.status).toBe(status)
    if (status === 403) {
      expect(await problemOf(answer)).toMatchObject({
        kind: 'forbidden',
        type: 'application/problem+json',
      })
    }
  })

  it.each([
    ['mechanic', 200],
    ['guide', 403],
    ['dispatcher', 200],
  ])('[R22] one’s own jobs: %s %i', async (who, status) => {
    expect((await board(who, '?whose=own')).status).toBe(status)
  })

  it.each([
    ['parts', 200],
    ['owner', 200],
    ['dispatcher', 200],
    ['both', 200],
    ['mechanic', 403],
    ['guide', 403],
  ])('[R22] the parts table: %s %i', async (who, status) => {
    expect((await parts(who)).status).toBe(status)
  })

  it('[R22] nobody without a session, with a revoked or a made-up one', async () => {
    expect((await board(null)).status).toBe(401)
    expect((await jobAnswer(null, mine)).status).toBe(401)
    const { cookie, sessionId } = await signIn(world.a, 'owner')
    const request = () => new Request('http://shop.invalid/api/desk/jobs', { headers: { cookie } })
    expect((await getBoard(request())).status).toBe(200)
    await asShop(world.a.id, (tx) =>
      revokeSession(tx, { id: sessionId, now: new Date().toISOString() }),
    )
    expect((await getBoard(request())).status).toBe(401)
    const forged = new Request('http://shop.invalid/api/desk/jobs', {
      headers: { cookie: 'next-auth.session-token=abc.def.ghi' },
    })
    expect((await getBoard(forged)).status).toBe(401)
  })

  it('[R22] another shop’s job, a job not one’s own and a random id answer the very same', async () => {
    const random = newId()
    const texts = new Set<string>()
    for (const [who, id] of [
      ['owner', foreign],
      ['owner', random],
      ['owner', 'no-uuid-at-all'],
      ['second', mine],
      ['second', random],
    ] as const) {
      const answer = await jobAnswer(who, id)
      expect(answer.status).toBe(404)
      texts.add(await answer.text())
    }
    expect(texts.size).toBe(1)
  })

  it('[R22] shows no row of another shop on the board or in the parts table', async () => {
    const answer = deskBoard.parse(await (await board('owner', '', world.b)).json())
    expect([...answer.open, ...answer.closed].map(({ job }) => job.id)).toEqual([foreign])
  })
})

describe('what the desk reads', () => {
  it('[R19] own jobs are those opened by or assigned to the person', async () => {
    const other = await makeJob(world.a, world.a.people.second!)
    const own = async () =>
      deskBoard
        .parse(await (await board('mechanic', '?whose=own')).json())
        .open.map(({ job }) => job.id)
    expect(await own()).toContain(mine)
    expect(await own()).not.toContain(other)
    const personId = world.a.people.mechanic!.id
    await asShop(world.a.id, async (tx) => {
      await assignJob(tx, { jobId: other, personId })
      await takeChanges(tx, [{ entity: 'job', id: other, jobId: other, whole: true }])
    })
    expect(await own()).toContain(other)
    expect((await jobAnswer('mechanic', other)).status).toBe(200)
  })

  it('[R19] counts entries, photos still on the phone and open part lines, and says when it last heard', async () => {
    const by = world.a.people.mechanic!
    const job = await makeJob(world.a, by)
    const photo = (hash: string) =>
      ({
        kind: 'photo',
        photo: { hash, bytes: 9, mime: 'image/png', width: 1, height: 1 },
        caption: null,
      }) as const
    const entries = [
      entryOf(job, by),
      entryOf(job, by, photo('a'.repeat(64))),
      entryOf(job, by, photo('b'.repeat(64))),
    ]
    const request = requestOf(job)
    await asShop(world.a.id, async (tx) => {
      await appendLogEntries(tx, { entries, receivedAt: request.askedAt })
      await insertPartRequests(tx, [
        { request, askedBy: by.id, askedOn: by.deviceId, receivedAt: request.askedAt },
      ])
      await insertPhoto(tx, {
        hash: 'a'.repeat(64),
        jobId: job,
        bytes: 9,
        mime: 'image/png',
        receivedAt: request.askedAt,
        receivedFrom: by.deviceId,
      })
      await takeChanges(tx, [
        ...entries.map(({ id }) => ({ entity: 'logEntry' as const, id, jobId: job })),
        { entity: 'partRequest', id: request.id, jobId: job },
        { entity: 'photo', id: 'a'.repeat(64), jobId: job },
      ])
    })
    const answer = deskBoard.parse(await (await board('dispatcher')).json())
    expect(answer.open.find((row) => row.job.id === job)).toMatchObject({
      entries: 3,
      photosMissing: 1,
      partsOpen: request.lines.length,
      heardAt: expect.any(String),
    })
    const found = deskJob.parse(await (await jobAnswer('dispatcher', job)).json())
    expect(found.entries.map(({ order }) => order)).toEqual([1, 2, 3])
    expect(found.photos.map(({ hash }) => hash)).toEqual(['a'.repeat(64)])
    expect(found.phones).toEqual([
      { id: by.deviceId, name: expect.any(String), reachedAt: expect.any(String) },
    ])
    expect(found.parts[0]?.lines).toHaveLength(request.lines.length)
    expect(found.reachedAt).not.toBeNull()
    expect(found.people.map(({ name }) => name)).toContain('Test mechanic')
    const table = deskParts.parse(await (await parts('parts')).json())
    expect(table.lines.filter((row) => row.request.id === request.id)).toHaveLength(
      request.lines.length,
    )
    expect(table.lines[0]).toMatchObject({ askedBy: 'Test mechanic', jobNumber: found.job.number })
  })

  it('[R13] keeps a job closed within the day apart, and leaves out one closed before', async () => {
    const by = world.a.people.mechanic!
    const [today, before] = [await makeJob(world.a, by), await makeJob(world.a, by)]
    const close = (id: string, at: string) =>
      asShop(world.a.id, async (tx) => {
        const stand = {
          state: 'closed',
          peopleState: 'safe',
          machineState: 'atShop',
          wayOut: 'tow',
        } as const
        await setJobStand(tx, { id, stand, by: { deviceId: null, at } })
        await takeChanges(tx, [{ entity: 'job', id, jobId: id, whole: true }])
      })
    const hour = 3_600_000
    await close(today, new Date(Date.now() - hour).toISOString())
    await close(before, new Date(Date.now() - 25 * hour).toISOString())
    const answer = deskBoard.parse(await (await board('dispatcher')).json())
    const closed = answer.closed.map(({ job }) => job.id)
    expect(closed).toContain(today)
    expect(closed).not.toContain(before)
    expect(answer.open.map(({ job }) => job.id)).not.toContain(today)
  })
})
