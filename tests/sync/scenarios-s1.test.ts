// S1, second half: the network comes back at 14:55 and drops twice while three photos and a voice note go.
// The first half is of the arithmetic (tests/diag, tests/standards) and of the screens (tests/e2e).
import { randomBytes } from 'node:crypto'
import { existsSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { witnessState } from '@/components/field/shell'
import { asShop } from '@/db/client'
import { listLog } from '@/db/queries/log-entries'
import type { LogBody } from '@/lib/model/log-entry'
import { countUnsent } from '@/lib/sync/client/keepsake'
import type { UnsentView } from '@/lib/sync/client/views'
import { jobOpen, machineAdd } from '../support/field-ops'
import type { TestFetch } from '../support/phone'
import { note } from '../support/phone-world'
import { realPhone } from '../support/real-phone'
import { openSyncWorld, type SyncWorld } from '../support/sync-world'
import { hashOf, noisyPicture, photoBody, voiceBody } from '../support/upload-world'
import { webmOf } from '../support/voices'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

const MB = 1_000_000
/** A picture of 1.4 MB: what stands behind its end makes it unlike the others and as long as asked. */
async function pictures(count: number): Promise<Buffer[]> {
  const picture = await noisyPicture(1_000)
  const rest = Math.max(0, 1.4 * MB - picture.length)
  return Array.from({ length: count }, () => Buffer.concat([picture, randomBytes(rest)]))
}

type Moment = { what: string; count: number; mark: string }

/**
 * A line that drops twice: once with a chunk under way that never arrives, once with a chunk that the shop
 * took and whose answer is lost. Each time the phone must try again by itself.
 */
function droppingLine(asked: string[]) {
  let chunks = 0
  let down = false
  const drop = (where: string): never => {
    down = true
    throw new TypeError(where)
  }
  const chunk = async (fetch: TestFetch, ...of: Parameters<TestFetch>) => {
    chunks += 1
    const at = chunks
    if (at === 3) drop('dropped on the way up')
    const answer = await fetch(...of)
    asked.push('chunk')
    return at === 7 ? drop('dropped on the way down') : answer
  }
  const through =
    (fetch: TestFetch): TestFetch =>
    async (path, init) => {
      if (down) throw new TypeError('no line')
      if (init.method === 'PATCH') return await chunk(fetch, path, init)
      const answer = await fetch(path, init)
      asked.push(path)
      return answer
    }
  return {
    through,
    isDown: () => down,
    back: () => {
      down = false
    },
  }
}

describe('[S1] the network returns and drops twice', () => {
  it('[S1] [P3] [PH3] [PH4] each entry once, 4 media, text before media, the mark whole only after the last byte', async () => {
    const asked: string[] = []
    const drops = droppingLine(asked)
    const { phone, line } = await realPhone(world.a, 'mechanic', { through: drops.through })
    const machine = machineAdd()
    const opening = jobOpen(machine.fields.id)
    const jobId = opening.fields.id
    line.fault = 'noLine'
    await phone.record([machine, opening])
    for (const words of [
      '12.18 V, meter cold',
      '12.18 V, meter warm',
      'bolt frozen',
      'fuel is fresh',
      'plug wet',
    ])
      await phone.record([note(phone, jobId, words)])
    const photos = await pictures(3)
    const voice = webmOf({ seconds: 22, noise: 'half a word' })
    const media: [Buffer, LogBody, 'image/jpeg' | 'audio/webm'][] = [
      ...photos.map((bytes): (typeof media)[number] => [bytes, photoBody(bytes), 'image/jpeg']),
      [voice, voiceBody(voice), 'audio/webm'],
    ]
    for (const [bytes, body, mime] of media) {
      const kept = { hash: hashOf(bytes), jobId, bytes: new Uint8Array(bytes).buffer, mime }
      await phone.record([phone.phone.entry(jobId, body, { bookVersion: 1 })], { photos: [kept] })
    }
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 15, stuckCount: 0 })
    asked.length = 0

    // What the mark at the top says, each time anything changes.
    const moments: Moment[] = []
    const leave = phone.phone.unsent.subscribe(() => {
      const view = phone.phone.unsent.get() as UnsentView | undefined
      if (view === undefined) return
      moments.push({ what: asked.at(-1) ?? '', count: view.count, mark: witnessState(view) })
    })
    line.fault = 'none'
    let tries = 0
    let drop = 0
    const left = () => countUnsent(phone.phone.core.db)
    while ((await left()) > 0) {
      tries += 1
      expect(tries).toBeLessThan(10)
      await phone.sync()
      if (!drops.isDown()) continue
      drop += 1
      expect(await left()).toBeGreaterThan(0)
      drops.back()
    }
    await expect.poll(() => moments.at(-1)?.count).toBe(0)
    leave()
    expect(drop).toBe(2)

    // Each entry once, all of what the phone shows, in its order.
    const log = await asShop(world.a.id, (tx) => listLog(tx, jobId))
    const shown = await phone.see(phone.phone.log(jobId))
    expect(log).toHaveLength(9)
    expect(shown.map((one) => one.entry.id)).toEqual(log.map((row) => row.id))
    expect(shown.every((one) => one.sent)).toBe(true)
    expect(log.map((row) => row.body.kind)).toEqual([
      ...Array(5).fill('note'),
      ...Array(3).fill('photo'),
      'voice',
    ])
    // Four media, whole.
    const folder = join(world.filesDir, world.a.id)
    for (const [bytes] of media) {
      const file = join(folder, hashOf(bytes))
      expect(existsSync(file)).toBe(true)
      expect(statSync(file).size).toBe(bytes.length)
    }
    const rows = await asShop(world.a.id, (tx) =>
      tx.selectFrom('photo').select('hash').where('jobId', '=', jobId).execute(),
    )
    expect(rows.map((row) => row.hash).sort()).toEqual(media.map(([bytes]) => hashOf(bytes)).sort())
    // Text before media: the first that went were the records.
    expect(asked[0]).toBe('/api/sync')
    expect(asked.indexOf('chunk')).toBeGreaterThan(0)
    // The mark is whole at the end and never before the last chunk was acknowledged.
    expect(moments.at(-1)).toMatchObject({ count: 0, mark: 'whole' })
    expect(moments.filter((moment) => moment.count > 0 && moment.mark === 'whole')).toEqual([])
    expect(moments.some((moment) => moment.what === 'chunk' && moment.mark === 'sending')).toBe(
      true,
    )
    expect(witnessState(await phone.see(phone.phone.unsent))).toBe('whole')
    expect(await phone.phone.core.db.photoBytes.count()).toBe(0)
    await expectWholeShop(world.a.id)
  })

  it('[S1] [PH4] one byte short of the last photo, the mark is not whole', async () => {
    const line: { loses: boolean } = { loses: true }
    const last: { hash: string } = { hash: '' }
    const through =
      (fetch: TestFetch): TestFetch =>
      async (path, init) => {
        // The answer to the last chunk of this file does not come.
        const answer = await fetch(path, init)
        const stored = answer.headers.get('x-farbench-stored') === last.hash
        if (line.loses && stored) throw new TypeError('answer lost')
        return answer
      }
    const { phone } = await realPhone(world.a, 'second', { through })
    const machine = machineAdd()
    const opening = jobOpen(machine.fields.id)
    const jobId = opening.fields.id
    const bytes = await noisyPicture(120)
    last.hash = hashOf(bytes)
    await phone.record([machine, opening])
    await phone.record([phone.phone.entry(jobId, photoBody(bytes), { bookVersion: 1 })], {
      photos: [{ hash: last.hash, jobId, bytes: new Uint8Array(bytes).buffer, mime: 'image/jpeg' }],
    })
    await phone.sync()
    const view = await phone.see(phone.phone.unsent)
    expect(view.count).toBe(1)
    expect(witnessState(view)).toBe('broken')
    line.loses = false
    await phone.sync()
    expect(witnessState(await phone.see(phone.phone.unsent))).toBe('whole')
  })
})
