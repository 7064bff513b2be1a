// Faults 27 and 28 of the fault list: a restored backup, and cursors that are none.
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/sync/route'
import { asShop } from '@/db/client'
import { findJob } from '@/db/queries/jobs'
import { listLog } from '@/db/queries/log-entries'
import { findPhoto } from '@/db/queries/photos'
import type { Cursor } from '@/lib/sync/protocol/message'
import { jobOpen } from '../support/field-ops'
import { note } from '../support/phone-world'
import { realPhone, statesOf } from '../support/real-phone'
import {
  exchangeOf,
  openSyncWorld,
  phoneOf,
  problemOf,
  pullAll,
  type SyncWorld,
} from '../support/sync-world'
import { hashOf, noisyPicture } from '../support/upload-world'
import { expectWholeShop } from '../support/whole-shop'
import { restore, takeBackup } from './simulator/backup'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)

describe('[fault 27] a backup an hour old is brought back', () => {
  it('[fault 27] [P12] every phone offers what the shop has lost, nothing is missing, nothing is there twice', async () => {
    const admin = new pg.Client({ connectionString: world.db.adminUrl })
    await admin.connect()
    const shops = [world.a.id, world.b.id]
    const one = await realPhone(world.a, 'mechanic')
    const two = await realPhone(world.a, 'second')
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    await one.phone.record([opening, note(one.phone, jobId, 'before the backup')])
    await one.phone.sync()
    await two.phone.sync()
    const backup = await takeBackup(admin, shops)

    const bytes = await noisyPicture(60)
    const photo = {
      hash: hashOf(bytes),
      bytes: bytes.length,
      mime: 'image/jpeg',
      width: 60,
      height: 60,
    } as const
    await one.phone.record([note(one.phone, jobId, 'in the hour')])
    await one.phone.record(
      [one.phone.phone.entry(jobId, { kind: 'photo', photo, caption: null }, { bookVersion: 1 })],
      {
        photos: [
          { hash: photo.hash, jobId, bytes: new Uint8Array(bytes).buffer, mime: photo.mime },
        ],
      },
    )
    await one.phone.sync()
    await two.phone.sync()
    await two.phone.record([
      note(two.phone, jobId, 'from the other phone'),
      {
        kind: 'job.move',
        jobId,
        fields: { from: 'open', to: 'underWay', reason: null },
      },
    ])
    await two.phone.sync()
    await one.phone.sync()
    const epoch = async () => (await one.phone.phone.core.db.meta.get('cursor'))?.value
    const before = (await epoch()) as Cursor
    two.line.fault = 'noLine'
    await two.phone.record([
      note(two.phone, jobId, 'unsent all the while'),
      {
        kind: 'job.move',
        jobId,
        fields: { from: 'underWay', to: 'waitingParts', reason: null },
      },
    ])

    await restore(admin, shops, backup)
    await admin.end()
    expect(await inA((tx) => listLog(tx, jobId))).toHaveLength(1)
    two.line.fault = 'none'
    for (let rounds = 0; rounds < 2; rounds += 1) {
      await one.phone.sync()
      await two.phone.sync()
    }
    await one.phone.sync()
    const log = await inA((tx) => listLog(tx, jobId))
    const words = log.map(({ body }) => (body.kind === 'note' ? body.words : body.kind))
    expect(words.toSorted()).toEqual(
      [
        'before the backup',
        'in the hour',
        'photo',
        'from the other phone',
        'unsent all the while',
      ].toSorted(),
    )
    // Each phone’s own order is kept.
    expect(words.indexOf('before the backup')).toBeLessThan(words.indexOf('in the hour'))
    expect(words.indexOf('from the other phone')).toBeLessThan(
      words.indexOf('unsent all the while'),
    )
    // And a step that was recorded since rests on the one the restoring took away.
    expect(await inA((tx) => findJob(tx, jobId))).toMatchObject({ state: 'waitingParts' })
    expect(await inA((tx) => findPhoto(tx, photo.hash))).toMatchObject({ jobId })
    expect(((await epoch()) as Cursor).epoch).not.toBe(before.epoch)
    for (const { phone } of [one, two]) {
      expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, stuckCount: 0 })
      expect(new Set(await statesOf(phone))).toEqual(new Set(['done']))
      const held = await phone.see(phone.phone.log(jobId))
      expect(held.map((line) => line.entry.id)).toEqual(log.map((row) => row.id))
    }
    await expectWholeShop(world.a.id)
  })
})

describe('[fault 28] a cursor that is not this phone’s', () => {
  it('[fault 28] [P11] [P12] of another shop, forged or of the future: from the start, and no row of another shop', async () => {
    const phones = await Promise.all([world.a, world.b].map((shop) => phoneOf(shop, 'owner')))
    const [mine, theirs] = phones as [(typeof phones)[0], (typeof phones)[0]]
    const foreign = new Set((await pullAll(theirs.device, theirs.cookie)).map((row) => row.id))
    expect(foreign.size).toBeGreaterThan(3)
    await pullAll(mine.device, mine.cookie)
    const own = mine.device.cursor as Cursor
    const odd: Cursor[] = [
      theirs.device.cursor as Cursor,
      { ...own, shop: world.b.id },
      { ...own, epoch: `${own.epoch}0` },
      { ...own, epoch: "' or true --" },
      { ...own, seq: Number.MAX_SAFE_INTEGER },
      { ...own, scopeVersion: own.scopeVersion + 7 },
    ]
    for (const cursor of odd) {
      const { pull } = await exchangeOf(mine.device.push([], { cookie: mine.cookie, cursor }))
      expect(pull).toMatchObject({ kind: 'reset', cursor: { shop: world.a.id, seq: 0 } })
      mine.device.cursor = cursor
      const rows = await pullAll(mine.device, mine.cookie)
      expect(rows.length).toBeGreaterThan(3)
      expect(rows.filter((row) => foreign.has(row.id))).toEqual([])
      expect(rows.find((row) => row.entity === 'shop')?.id).toBe(world.a.id)
    }
  })

  it('[fault 28] [P12] that is no cursor at all is refused whole with 400', async () => {
    const { device, cookie } = await phoneOf(world.a, 'owner')
    await pullAll(device, cookie)
    const own = device.cursor as Cursor
    for (const cursor of [
      { ...own, seq: -1 },
      { ...own, seq: 1.5 },
      { ...own, shop: 7 },
      'start',
      [],
    ]) {
      const answer = await POST(device.push([], { cookie, cursor: cursor as never }))
      expect(await problemOf(answer)).toMatchObject({ status: 400, kind: 'badJson' })
    }
  })
})
