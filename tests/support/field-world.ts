// The real routes with people at work in real stores: what S11 begins from.
import { createHash } from 'node:crypto'
import { asShop } from '@/db/client'
import { listLog } from '@/db/queries/log-entries'
import type { OpInput } from '@/lib/sync/protocol/op'
import { type FieldApp, newBrowser, startApp, type TestBrowser } from './field-app'
import { jobOpen } from './field-ops'
import { jpegOf } from './pictures'
import { deskOf, type OwnersDesk } from './quarantine-world'
import { RealShop } from './real-shop'
import { openSyncWorld, type SyncWorld, signIn } from './sync-world'

export const note = (app: FieldApp, jobId: string, words: string): OpInput =>
  app.phone().entry(jobId, { kind: 'note', words }, { bookVersion: 1 })

let shade = 0
/** A photo entry of a job with its bytes, unlike any other. */
export function photo(app: FieldApp, jobId: string) {
  shade += 1
  const bytes = Buffer.concat([jpegOf(), Buffer.from(`shade ${shade}`)])
  const hash = createHash('sha256').update(bytes).digest('hex')
  const about = { hash, bytes: bytes.length, mime: 'image/jpeg' as const, width: 1, height: 1 }
  const entry = app
    .phone()
    .entry(jobId, { kind: 'photo', photo: about, caption: null }, { bookVersion: 1 })
  const kept = { hash, jobId, bytes: new Uint8Array(bytes).buffer, mime: about.mime }
  return { hash, entry, kept }
}

export type AtWork = Awaited<ReturnType<FieldWorld['atWork']>>

/** Seven unsent items in flight mode, two of them photos; answers the hashes of those. */
export async function sevenUnsent({ app, line, jobId }: AtWork): Promise<string[]> {
  line.fault = 'noLine'
  for (let i = 1; i <= 5; i += 1) await app.phone().record([note(app, jobId, `note ${i}`)])
  const photos = [photo(app, jobId), photo(app, jobId)]
  for (const one of photos) await app.phone().record([one.entry], { photos: [one.kept] })
  await app.phone().sender.idle()
  return photos.map((one) => one.hash)
}

/** Two shops, the owner of the first at the desk, and people who open the field app. */
export class FieldWorld {
  readonly world: SyncWorld
  readonly desk: OwnersDesk

  static async open(): Promise<FieldWorld> {
    const world = await openSyncWorld()
    return new FieldWorld(world, deskOf((await signIn(world.a, 'owner')).cookie))
  }

  private constructor(world: SyncWorld, desk: OwnersDesk) {
    this.world = world
    this.desk = desk
  }

  inA = <T>(run: Parameters<typeof asShop<T>>[1]): Promise<T> => asShop(this.world.a.id, run)
  entriesOf = (jobId: string) => this.inA((tx) => listLog(tx, jobId))

  /** A browser where that person of the first shop signed in, with one job of theirs at the shop. */
  async atWork(who: string, browser: TestBrowser = newBrowser()) {
    const session = await signIn(this.world.a, who)
    const line = new RealShop(session.cookie)
    const app = startApp(line.fetch, browser)
    await app.opened()
    const opening = jobOpen(this.world.a.machineId)
    await app.phone().record([opening])
    await app.sync()
    return { browser, app, line, session, jobId: opening.fields.id }
  }
}
