// S11, the rest: an old session, a shared tablet, a stranger. Real routes and stores.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getDeskJob } from '@/app/api/desk/jobs/[id]/route'
import { GET as getPhoto } from '@/app/api/photos/[hash]/route'
import { listAudit } from '@/db/queries/audit'
import { revokeSession } from '@/db/queries/sign-in'
import { countUnsent } from '@/lib/sync/client/keepsake'
import { lostOf } from '@/lib/sync/client/lost'
import { databases, newBrowser, startApp } from '../support/field-app'
import { partRequestAsk } from '../support/field-ops'
import { FieldWorld, note, photo } from '../support/field-world'
import { recordPastGate } from '../support/past-gate'
import { RawDevice } from '../support/raw-device'
import { RealShop } from '../support/real-shop'
import { enrolAt, type SyncWorld, signIn, sync } from '../support/sync-world'

let at: FieldWorld
let world: SyncWorld
beforeAll(async () => {
  at = await FieldWorld.open()
  world = at.world
})
afterAll(() => world.close())

describe('[S11] an old session', () => {
  it('[P18] after 9 days 12 items are taken by the key, then it asks to sign in', async () => {
    const browser = newBrowser()
    const { app, line, session, jobId } = await at.atWork('mechanic', browser)
    line.fault = 'noLine'
    for (let i = 0; i < 12; i += 1) await app.phone().record([note(app, jobId, `day ${i}`)])
    await app.phone().sender.idle()
    await app.end()
    await at.inA((tx) =>
      revokeSession(tx, { id: session.sessionId, now: new Date(Date.now() - 1000).toISOString() }),
    )
    browser.clock.ms += 9 * 24 * 3600 * 1000
    line.fault = 'none'
    const back = startApp(line.fetch, browser)
    expect(await back.opened()).toMatchObject({ kind: 'ready' })
    await back.sync()
    expect(await at.entriesOf(jobId)).toHaveLength(12)
    expect(await countUnsent(back.phone().core.db)).toBe(0)
    expect(back.phone().sender.state.get().need).toBe('signIn')
    await back.end()
  })
})

describe('[S11] a shared tablet', () => {
  it('[fault 12] [P18] [SO1] [SO2] G1 signs out with 3 unsent; G2 finds nothing of G1, and sends nothing of theirs', async () => {
    const browser = newBrowser()
    const g1 = await at.atWork('mechanic', browser)
    const first = g1.app.phone()
    g1.line.fault = 'noLine'
    for (const words of ['one', 'two', 'three']) await first.record([note(g1.app, g1.jobId, words)])
    expect(await g1.app.store.tryToSend()).toBe(3)
    expect(g1.app.store.session.get()).toMatchObject({ kind: 'ready' })
    const files = await first.exportFiles()
    expect(files).toHaveLength(1)
    await g1.app.store.signOut()
    expect(g1.app.store.session.get()).toEqual({ kind: 'signedOut' })
    await g1.app.end()

    const line = new RealShop((await signIn(world.a, 'guide')).cookie)
    const g2 = startApp(line.fetch, browser)
    expect(await g2.opened()).toMatchObject({ actor: { personId: world.a.people.guide?.id } })
    await g2.sync()
    const { db } = g2.phone().core
    expect(db.name).not.toBe(first.core.db.name)
    expect(await countUnsent(db)).toBe(0)
    expect(await db.outbox.count()).toBe(0)
    expect(await db.draft.count()).toBe(0)
    expect(
      (
        await at.inA((tx) =>
          tx
            .selectFrom('syncOp')
            .select('opId')
            .where('deviceId', '=', g2.phone().deviceId)
            .execute(),
        )
      ).length,
    ).toBe(0)
    expect(await at.entriesOf(g1.jobId)).toEqual([])
    await g2.store.signOut()
    await g2.end()

    g1.line.fault = 'none'
    g1.line.cookie = (await signIn(world.a, 'mechanic')).cookie
    const back = startApp(g1.line.fetch, browser)
    expect(await back.opened()).toMatchObject({ actor: { personId: world.a.people.mechanic?.id } })
    await back.sync()
    const log = await at.entriesOf(g1.jobId)
    expect(log.map((row) => row.authorId)).toEqual(Array(3).fill(world.a.people.mechanic?.id))
    expect(log.every((row) => row.deviceId === back.phone().deviceId)).toBe(true)
    await back.end()
  })

  it('[SO3] deletes unsent work only with the right count, and tells the shop at the next sign-in', async () => {
    const browser = newBrowser()
    const { app, line, jobId } = await at.atWork('mechanic', browser)
    const { deviceId } = app.phone()
    line.fault = 'noLine'
    for (const words of ['one', 'two']) await app.phone().record([note(app, jobId, words)])
    expect(await app.store.tryToSend()).toBe(2)
    expect(await app.store.signOutAndDelete(1)).toBe(false)
    expect(await countUnsent(app.phone().core.db)).toBe(2)
    expect(await app.store.signOutAndDelete(2)).toBe(true)
    expect(app.store.session.get()).toEqual({ kind: 'signedOut' })
    expect((await databases(browser)).filter((name) => name.includes(world.a.id))).toEqual([])
    await app.end()
    line.fault = 'none'
    const leaving = startApp(line.fetch, browser)
    expect(await leaving.opened()).toEqual({ kind: 'signedOut' })
    await leaving.end()
    line.cookie = (await signIn(world.a, 'mechanic')).cookie
    const back = startApp(line.fetch, browser)
    await back.opened()
    expect(await lostOf(back.phone().core.db)).toBeNull()
    expect((await at.desk.phone(deviceId)).gone).toMatchObject({ lostOps: 0, deletedOps: 2 })
    const audit = await at.inA((tx) => listAudit(tx, null))
    expect(audit.filter((one) => one.entityId === deviceId).map((one) => one.action)).toContain(
      'device.emptied',
    )
    await back.end()
  })
})

describe('[S11] a stranger', () => {
  it('[P11] a guide’s hand-made release or part order is refused by role and kept as refused', async () => {
    const { app, jobId } = await at.atWork('guide')
    await recordPastGate(app.phone(), [partRequestAsk(jobId)])
    await app.sync()
    const { db } = app.phone().core
    expect(await db.outbox.where('state').equals('stuck').toArray()).toMatchObject([
      { kind: 'partRequest.ask', reason: 'forbidden' },
    ])
    const kept = await at.inA((tx) =>
      tx.selectFrom('syncOp').select(['kind', 'code']).where('outcome', '=', 'rejected').execute(),
    )
    expect(kept).toContainEqual({ kind: 'partRequest.ask', code: 'forbidden' })
    await app.end()
  })

  it('[P11] shop B gets for shop A’s job and photo what it gets for a random id', async () => {
    const { app, jobId } = await at.atWork('mechanic')
    const one = photo(app, jobId)
    await app.phone().record([one.entry], { photos: [one.kept] })
    await app.sync()
    await app.end()
    const { cookie } = await signIn(world.b, 'owner')
    const job = async (id: string) => {
      const request = new Request('http://shop.invalid/', { headers: { cookie } })
      const answer = await getDeskJob(request, { params: Promise.resolve({ id }) })
      return [answer.status, await answer.text()]
    }
    expect(await job(jobId)).toEqual(await job(crypto.randomUUID()))
    const file = async (hash: string) => {
      const request = new Request(`http://shop.invalid/api/photos/${hash}`, { headers: { cookie } })
      const answer = await getPhoto(request, { params: Promise.resolve({ hash }) })
      return [answer.status, await answer.text()]
    }
    expect(await file(one.hash)).toEqual(await file('0'.repeat(64)))
    const unset = await world.db.app.selectFrom('quarantineOp').selectAll().execute()
    expect(unset).toEqual([])
    const raw = new RawDevice({ shopId: world.b.id, personId: world.b.people.owner?.id ?? '' })
    expect((await enrolAt(raw, cookie)).status).toBe(200)
    const op = raw.op({
      kind: 'log.add',
      jobId,
      fields: {
        id: crypto.randomUUID(),
        jobId,
        supersedes: null,
        happenedAt: raw.now(),
        writtenAt: raw.now(),
        zone: 'Etc/UTC',
        authorId: raw.owner.personId,
        deviceId: raw.id,
        engineVersion: '1',
        bookVersion: 1,
        body: { kind: 'note', words: 'from elsewhere' },
      },
    })
    const answer = await sync(raw, [op])
    expect(answer.results).toMatchObject([{ result: 'blocked', on: jobId }])
  })
})
