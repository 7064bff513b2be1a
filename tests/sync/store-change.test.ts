// What a shop can tell of a store that changed or fell silent, and what it cannot (P22).
import { v7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { silentIsRead, silentOf } from '@/lib/sync/client/lost'
import { newBrowser, startApp, type TestBrowser } from '../support/field-app'
import { FieldWorld, note, photo } from '../support/field-world'
import { newIndexed } from '../support/phone'
import { RealShop } from '../support/real-shop'
import { exchangeOf, phoneOf, signIn, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let at: FieldWorld
beforeAll(async () => {
  at = await FieldWorld.open()
})
afterAll(() => at.world.close())

const auditOf = async (action: string, entityId: string) =>
  (await asShop(at.world.a.id, (tx) => listAudit(tx, null))).filter(
    (one) => one.action === action && one.entityId === entityId,
  )

/** Databases and what is remembered outside of them, both gone: the whole of a site's data. */
function clearAll(browser: TestBrowser) {
  browser.indexed = newIndexed()
  browser.keeper.words = null
}

describe('[P22] a phone that speaks out of another store', () => {
  it('[P22] leaves one entry in the audit trail, also when two of its tabs come at once', async () => {
    const { device, cookie } = await phoneOf(at.world.a, 'mechanic')
    const [first, second] = [v7(), v7()]
    for (const canary of [null, first, first]) await sync(device, [], { cookie, canary })
    expect(await auditOf('device.storeChanged', device.id)).toEqual([])
    const tabs = [1, 2, 3].map(() => exchangeOf(device.push([], { cookie, canary: second })))
    await Promise.all(tabs)
    await sync(device, [], { cookie, canary: null })
    expect(await auditOf('device.storeChanged', device.id)).toMatchObject([
      { deviceId: device.id, detail: { before: first, now: second, highestDseq: 0 } },
    ])
    await expectWholeShop(at.world.a.id)
  })

  it('[P22] of a phone that was taken out as well', async () => {
    const { device, cookie } = await phoneOf(at.world.a, 'second')
    await sync(device, [], { cookie, canary: v7() })
    await at.desk.revoke(device.id)
    await sync(device, [], { canary: v7() })
    expect(await auditOf('device.storeChanged', device.id)).toHaveLength(1)
  })
})

describe('[P22] [fault 21] a phone whose whole site data was cleared', () => {
  /** A phone that handed its records over and whose line went before its two photos had gone. */
  async function cutBeforePhotos(browser: TestBrowser) {
    const { app, line, jobId } = await at.atWork('guide', browser)
    const photos = [photo(app, jobId), photo(app, jobId)]
    line.fault = 'noLine'
    for (const one of photos) await app.phone().record([one.entry], { photos: [one.kept] })
    await app.phone().sender.idle()
    line.after = (path) => {
      if (path === '/api/sync') line.fault = 'noLine'
      return Promise.resolve()
    }
    line.fault = 'none'
    await app.sync()
    const { deviceId } = app.phone()
    await app.end()
    return { deviceId, jobId }
  }
  const signedIn = async (who: string, browser: TestBrowser) => {
    const line = new RealShop((await signIn(at.world.a, who)).cookie)
    const app = startApp(line.fetch, browser)
    await app.opened()
    return app
  }

  it('[P22] [fault 21] is told at the next sign-in what it said it held, once, and it stands on record', async () => {
    const browser = newBrowser()
    const { deviceId } = await cutBeforePhotos(browser)
    expect((await at.desk.phone(deviceId)).held).toMatchObject({ ops: 0, photos: 2 })
    clearAll(browser)
    const app = await signedIn('guide', browser)
    const { lastSeenAt } = await at.desk.phone(deviceId)
    const told = { phones: 1, ops: 0, photos: 2, lastAt: lastSeenAt }
    expect(await silentOf(app.phone().core.db)).toEqual(told)
    expect(await auditOf('device.silent', deviceId)).toMatchObject([
      { deviceId: app.phone().deviceId, detail: { ops: 0, photos: 2, lastSeenAt } },
    ])
    await silentIsRead(app.phone().core.db)
    await app.sync()
    expect(await silentOf(app.phone().core.db)).toBeNull()
    await app.end()
  })

  it('[P22] tells nobody else, nothing of a phone that sent all, and nothing once it was heard again', async () => {
    const other = await signedIn('mechanic', newBrowser())
    expect(await silentOf(other.phone().core.db)).toBeNull()
    await other.end()
    const browser = newBrowser()
    const { deviceId } = await cutBeforePhotos(browser)
    const back = await signedIn('guide', browser)
    await back.sync()
    await back.end()
    expect((await at.desk.phone(deviceId)).held).toMatchObject({ ops: 0, photos: 0 })
    const fresh = await signedIn('guide', newBrowser())
    expect(await auditOf('device.silent', deviceId)).toEqual([])
    await fresh.end()
  })

  it('[P22] cannot be told of work made after the last contact: the list says only when that was', async () => {
    const browser = newBrowser()
    const { app, line, jobId } = await at.atWork('second', browser)
    line.fault = 'noLine'
    await app.phone().record([note(app, jobId, 'nobody will ever hear of this')])
    const { deviceId } = app.phone()
    await app.end()
    clearAll(browser)
    const again = await signedIn('second', browser)
    expect(await silentOf(again.phone().core.db)).toBeNull()
    expect(await at.desk.phone(deviceId)).toMatchObject({ held: { ops: 0, photos: 0 }, gone: null })
    expect((await at.desk.phone(deviceId)).lastSeenAt).not.toBeNull()
    await again.end()
  })
})
