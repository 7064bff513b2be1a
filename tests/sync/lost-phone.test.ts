// S11, the lost phone: taken out, it hands over, is emptied, and the owner decides. Real routes and stores.
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getPhoto } from '@/app/api/photos/[hash]/route'
import { listAudit } from '@/db/queries/audit'
import { DeviceDb, knownPersons, wasEmptied } from '@/lib/sync/client/device-db'
import { countUnsent } from '@/lib/sync/client/keepsake'
import { databases, newBrowser, startApp } from '../support/field-app'
import { machineAdd } from '../support/field-ops'
import { FieldWorld, note, sevenUnsent } from '../support/field-world'
import { recordPastGate } from '../support/past-gate'
import { RawDevice } from '../support/raw-device'
import { enrolAt, type SyncWorld, signIn } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'
import { restore, takeBackup } from './simulator/backup'

let at: FieldWorld
let world: SyncWorld
beforeAll(async () => {
  at = await FieldWorld.open()
  world = at.world
})
afterAll(() => world.close())

describe('[S11] a lost phone', () => {
  it('[Q1] [Q2] [Q4] [Q5] [Q6] hands its 7 items into quarantine, is emptied, and the owner decides', async () => {
    const m2 = await at.atWork('second')
    const { app, browser, line, session, jobId } = m2
    const { deviceId } = app.phone()
    const hashes = await sevenUnsent(m2)
    expect(await countUnsent(app.phone().core.db)).toBe(9)
    const before = await at.desk.phone(deviceId)
    expect(before.held).toMatchObject({ ops: 0, photos: 0 })
    expect(before.lastSeenAt).not.toBeNull()

    expect((await at.desk.revoke(deviceId, 'Lost on the north trail')).status).toBe(200)
    const copied = new RawDevice({ shopId: world.a.id, personId: app.phone().actor.personId })
    expect((await enrolAt(copied, session.cookie)).status).toBe(401)

    line.fault = 'none'
    await app.sync()
    expect(await at.entriesOf(jobId)).toEqual([])
    const { items, wipeToldAt } = await at.desk.phone(deviceId)
    expect(items).toHaveLength(7)
    expect(items.filter((item) => item.file?.here)).toHaveLength(2)
    expect(wipeToldAt).not.toBeNull()

    expect(app.store.session.get()).toEqual({ kind: 'signedOut', emptied: true })
    expect(app.store.phone.get()).toBeNull()
    expect((await databases(browser)).filter((name) => name.includes(world.a.id))).toEqual([])
    expect(browser.keeper.words).toBe('[]')
    expect(browser.pages.dropped).toBe(1)
    const device = new DeviceDb(browser.indexed)
    expect(await knownPersons(device)).toEqual([])
    expect(await wasEmptied(device)).toBe(true)
    device.close()
    await app.end()

    const [refused, ...others] = items
    for (const { opId } of others) {
      const answer = await at.desk.decided(deviceId, { decision: 'accept', opId })
      expect(answer).toMatchObject([{ is: 'accepted' }])
    }
    const form = { decision: 'refuse', opId: refused?.opId, reason: 'Not about this machine' }
    expect(await at.desk.decided(deviceId, form)).toMatchObject([{ is: 'refused' }])
    const log = await at.entriesOf(jobId)
    expect(log).toHaveLength(6)
    expect(log.every((row) => row.authorId === world.a.people.second?.id)).toBe(true)
    expect(log.every((row) => row.deviceId === deviceId)).toBe(true)
    for (const hash of hashes) {
      const { cookie } = await signIn(world.a, 'dispatcher')
      const shown = await getPhoto(
        new Request(`http://shop.invalid/api/photos/${hash}`, { headers: { cookie } }),
        { params: Promise.resolve({ hash }) },
      )
      expect(shown.status).toBe(200)
    }
    const audit = (await at.inA((tx) => listAudit(tx, null))).map((one) => one.action)
    expect(audit.filter((action) => action === 'quarantine.accepted')).toHaveLength(6)
    expect(audit.filter((action) => action === 'quarantine.refused')).toHaveLength(1)
    await expectWholeShop(world.a.id)
  })

  it('[Q4] told again at the next start; signing in makes a new phone of it', async () => {
    const { app, browser, line, jobId } = await at.atWork('mechanic')
    const { deviceId } = app.phone()
    await at.desk.revoke(deviceId)
    await app.sync()
    await app.end()
    line.cookie = null
    const later = startApp(line.fetch, browser)
    expect(await later.opened()).toEqual({ kind: 'signedOut', emptied: true })
    await later.end()
    line.cookie = (await signIn(world.a, 'mechanic')).cookie
    const again = startApp(line.fetch, browser)
    expect(await again.opened()).toMatchObject({ kind: 'ready' })
    expect(again.phone().deviceId).not.toBe(deviceId)
    await again.phone().record([note(again, jobId, 'after')])
    await again.sync()
    expect((await at.entriesOf(jobId)).map((row) => row.deviceId)).toEqual([again.phone().deviceId])
    expect((await at.desk.phone(deviceId)).gone).toBeNull()
    await again.end()
  })

  it('[Q4] offers what was stuck or given up as well before it empties itself', async () => {
    const { app, line, jobId } = await at.atWork('guide')
    const { deviceId } = app.phone()
    const machine = machineAdd()
    await recordPastGate(app.phone(), [machine])
    await app.phone().record([note(app, jobId, 'given up')])
    await app.sync()
    const { db } = app.phone().core
    const stuck = await db.outbox.where('state').equals('stuck').toArray()
    expect(stuck.map((record) => record.kind)).toEqual(['machine.add'])
    line.fault = 'noLine'
    await app.phone().record([note(app, jobId, 'set aside here'), note(app, jobId, 'let go')])
    await app.phone().sender.idle()
    const [aside, letGo] = await db.outbox.where('state').equals('waiting').toArray()
    await db.outbox.update(aside?.dseq ?? 0, { state: 'stuck', reason: 'invalid' })
    await db.outbox.update(letGo?.dseq ?? 0, { state: 'stuck', reason: 'invalid' })
    await app.phone().letGo({ opId: letGo?.opId ?? '' })
    await at.desk.revoke(deviceId)
    line.fault = 'none'
    await app.sync()
    expect(app.store.session.get()).toMatchObject({ emptied: true })
    const { items } = await at.desk.phone(deviceId)
    expect(items.map((item) => item.opId).sort()).toEqual([aside?.opId, letGo?.opId].sort())
    await app.end()
  })

  it('[Q4] [P12] offers anew what a shop restored from a backup has lost, before it empties itself', async () => {
    const { app, jobId } = await at.atWork('second')
    const { deviceId } = app.phone()
    const admin = new pg.Client({ connectionString: world.db.adminUrl })
    await admin.connect()
    const backup = await takeBackup(admin, [world.a.id])
    const lost = note(app, jobId, 'Taken, and gone with the restore')
    await app.phone().record([lost])
    await app.sync()
    expect(await at.entriesOf(jobId)).toHaveLength(1)
    await restore(admin, [world.a.id], backup)
    await admin.end()
    expect(await at.entriesOf(jobId)).toEqual([])
    await at.desk.revoke(deviceId)
    await app.sync()
    expect(app.store.session.get()).toMatchObject({ emptied: true })
    const { items } = await at.desk.phone(deviceId)
    expect(items.map((item) => item.kind)).toEqual(['log.add'])
    await app.end()
  })

  it('[Q4] [P12] is emptied though the bytes of a photo are gone at both ends: nothing is left to lose', async () => {
    const { app, jobId } = await at.atWork('second')
    const { deviceId } = app.phone()
    const { core } = app.phone()
    await app.phone().record([note(app, jobId, 'Taken')])
    await app.sync()
    const gone = { jobId, mime: 'image/jpeg', size: 9, since: 1, state: 'stuck' as const }
    await core.db.photo.put({ ...gone, hash: 'a'.repeat(64), reason: 'bytesGone' })
    expect(await countUnsent(core.db)).toBe(1)
    await at.desk.revoke(deviceId)
    await app.sync()
    expect(app.store.session.get()).toMatchObject({ emptied: true })
    await app.end()
  })

  it('a 403 without the order keeps everything', async () => {
    const { app, jobId, line } = await at.atWork('mechanic')
    line.fault = 'noLine'
    await app.phone().record([note(app, jobId, 'kept')])
    await app.phone().sender.idle()
    line.instead = new Response(JSON.stringify({ kind: 'deviceRevoked' }), {
      status: 403,
      headers: { 'content-type': 'application/problem+json' },
    })
    line.fault = 'none'
    await app.sync()
    expect(app.phone().sender.state.get().need).toBe('refused')
    expect(await countUnsent(app.phone().core.db)).toBe(1)
    await app.end()
  })

  const STEPS = [
    'look',
    'closed',
    'planned',
    'keys',
    'tables',
    'meta',
    'store',
    'pages',
    'keepsake',
    'person',
    'book',
    'done',
  ]
  it.each(STEPS)(
    '[Q4] killed at "%s" it goes on emptying at the next start, never half',
    async (last) => {
      const browser = newBrowser()
      const first = await at.atWork('mechanic', browser)
      await first.app.end()
      const { line, session } = first
      let dead = false
      const app = startApp(line.fetch, browser, (name) => {
        if (dead || name === `wipe:${last}`) {
          dead = true
          throw new Error('killed')
        }
      })
      await app.opened()
      const { deviceId } = app.phone()
      await at.desk.revoke(deviceId)
      await app.sync().catch(() => undefined)
      expect(dead).toBe(true)
      app.store.phone.get()?.close()
      await app.end()
      line.cookie = session.cookie
      const next = startApp(line.fetch, browser)
      await next.opened()
      expect(next.store.session.get()).toEqual({ kind: 'signedOut', emptied: true })
      expect((await databases(browser)).filter((name) => name.includes(world.a.id))).toEqual([])
      expect(browser.keeper.words).toBe('[]')
      await next.end()
    },
  )

  it('[Q4] what is recorded while the order comes in is handed over first', async () => {
    const { app, line, jobId } = await at.atWork('mechanic')
    const { deviceId } = app.phone()
    await at.desk.revoke(deviceId)
    const late = note(app, jobId, 'a moment too late')
    let once = true
    line.after = async () => {
      if (once) {
        once = false
        await app.phone().record([late])
      }
    }
    await app.sync()
    await app.store.phone.get()?.sender.idle()
    expect((await at.desk.phone(deviceId)).items).toMatchObject([
      { entry: { body: { words: 'a moment too late' } } },
    ])
    expect(app.store.session.get()).toMatchObject({ emptied: true })
    await app.end()
  })
})
