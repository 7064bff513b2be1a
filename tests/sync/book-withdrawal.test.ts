import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getBook } from '@/app/api/codebook/route'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { publishedBook, publishedVersion } from '@/db/queries/code-book'
import { listWithdrawals } from '@/db/queries/code-book-withdrawal'
import { type BookWithdrawal, bookWithdrawal, type WithdrawForm } from '@/lib/model/book-withdrawal'
import type { CodeBookItem } from '@/lib/model/code-book'
import type { LogBody } from '@/lib/model/log-entry'
import { bookManifest, bookNotices } from '@/lib/sync/protocol/book'
import { changedJobs } from '@/lib/sync/server/book/changed-jobs'
import { publishDraft } from '@/lib/sync/server/book/publish-draft'
import { type BookHand, takeDraft } from '@/lib/sync/server/book/take-draft'
import { withdraw } from '@/lib/sync/server/book/withdraw'
import { smallRightBook } from '../support/book-fixture'
import { jobOpen, logAdd } from '../support/field-ops'
import { newId } from '../support/shop-fixture'
import { openSyncWorld, phoneOf, pullAll, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
  await publish(smallRightBook())
})
afterAll(() => world.close())

const handOf = (who: string): BookHand => {
  const person = world.a.people[who]
  const actor = { shopId: world.a.id, personId: person?.id ?? '', roles: person?.roles ?? [] }
  return { actor, now: Date.now(), newId }
}
async function publish(items: CodeBookItem[]): Promise<number> {
  const hand = handOf('owner')
  await takeDraft(hand, { book: { items, unseparated: [] }, note: null, replace: true })
  const made = await publishDraft(hand)
  if (!made.ok) throw new Error(made.problem.kind)
  return made.value.version
}
const slower = (minutes: number): CodeBookItem[] =>
  smallRightBook().map((item) => (item.kind === 'setup' ? { ...item, minutes } : item))
const otherCheck = (): CodeBookItem[] =>
  slower(5).map((item) => (item.kind === 'check' ? { ...item, purpose: 'Said anew.' } : item))

const CHECK: WithdrawForm = {
  what: 'check',
  itemId: 'lookAtPlug',
  reason: 'The plug may be hot.',
  instead: 'Wait ten minutes first.',
}
const wet: LogBody = {
  kind: 'check',
  checkId: 'lookAtPlug',
  outcome: 'wet',
  asWritten: true,
  differed: null,
}
const complaint = { words: 'It dies when I let go', symptom: 'stalls', lampOn: false }

/** The withdrawals a phone was told of, by its own pull. */
const told = (rows: { entity: string; row: unknown }[]): BookWithdrawal[] =>
  rows
    .filter(({ entity }) => entity === 'bookWithdrawal')
    .map(({ row }) => bookWithdrawal.parse(row))

async function jobWith(who: string, bodies: LogBody[], bookVersion = 1): Promise<string> {
  const { device } = await phoneOf(world.a, who)
  const job = jobOpen(world.a.machineId, { complaint })
  const entries = bodies.map((body) => logAdd(device, job.fields.id, body, { bookVersion }))
  await sync(device, [device.op(job), ...entries.map((entry) => device.op(entry))])
  return job.fields.id
}

describe('[R23] [CB41] a safety withdrawal', () => {
  it('[CB41] is the owner’s word alone, about what is in the book, and once', async () => {
    expect(await withdraw(handOf('mechanic'), CHECK)).toMatchObject({
      problem: { kind: 'forbidden' },
    })
    expect(await withdraw(handOf('owner'), { ...CHECK, itemId: 'nothing' })).toMatchObject({
      problem: { kind: 'notFound' },
    })
    expect(await withdraw(handOf('owner'), { ...CHECK, what: 'limit' })).toMatchObject({
      problem: { kind: 'noLimit' },
    })
    expect(await asShop(world.a.id, (tx) => listWithdrawals(tx))).toEqual([])
  })

  it('[CB41] [CB42] reaches every phone by its next pull, is acknowledged once, logged, and told on', async () => {
    const guide = await phoneOf(world.a, 'guide')
    const second = await phoneOf(world.a, 'second')
    const stranger = await phoneOf(world.b, 'owner')
    await pullAll(guide.device, guide.cookie)
    const made = await withdraw(handOf('owner'), CHECK)
    expect(made.ok).toBe(true)
    const id = made.ok ? made.value.id : ''
    expect(await withdraw(handOf('owner'), CHECK)).toMatchObject({
      problem: { kind: 'withdrawnBefore' },
    })
    const [heard] = told(await pullAll(guide.device, guide.cookie))
    expect(heard).toMatchObject({
      id,
      what: 'check',
      itemId: 'lookAtPlug',
      name: 'Look at the plug',
      versions: [1],
      upTo: 1,
      heard: [],
    })
    expect(told(await pullAll(stranger.device, stranger.cookie))).toEqual([])

    const at = guide.device.now()
    const fields = { withdrawalId: id, at }
    const op = () => guide.device.op({ kind: 'book.heard', fields, entityId: id })
    const first = op()
    expect(await sync(guide.device, [first, op()])).toMatchObject({ results: [] })
    expect((await sync(guide.device, [first])).results).toEqual([
      { opId: first.id, result: 'duplicate' },
    ])
    const personId = world.a.people.guide?.id ?? ''
    expect(told(await pullAll(second.device, second.cookie))[0]?.heard).toEqual([{ personId, at }])
    const url = 'http://shop.invalid/api/codebook?as='
    const ask = async (as: string) =>
      (await getBook(new Request(`${url}${as}`, { headers: { cookie: second.cookie } }))).json()
    expect(bookNotices.parse(await ask('notices'))).toMatchObject({
      newest: 1,
      withdrawals: [{ id }],
    })
    expect(bookManifest.parse(await ask('manifest')).withdrawals).toMatchObject([{ id }])
    const trail = await asShop(world.a.id, (tx) => listAudit(tx, null))
    const lines = trail.filter(({ action }) => action === 'book.heard')
    expect(lines[0]).toMatchObject({ actorId: personId, entityId: id, deviceId: guide.device.id })
    expect(trail.some(({ action }) => action === 'book.withdrawn')).toBe(true)
  })

  it('[CB42] one the shop never made is refused, and another shop’s is as unknown', async () => {
    const stranger = await phoneOf(world.b, 'guide')
    const [{ id: theirs } = { id: '' }] = await asShop(world.a.id, (tx) => listWithdrawals(tx))
    for (const id of [newId(), theirs]) {
      const fields = { withdrawalId: id, at: stranger.device.now() }
      const op = stranger.device.op({ kind: 'book.heard', fields, entityId: id })
      expect((await sync(stranger.device, [op])).results).toMatchObject([
        { result: 'rejected', code: 'no_parent' },
      ])
    }
  })

  it('[CB41] holds in later versions with the same content, and not in one that was put right', async () => {
    const phone = await phoneOf(world.a, 'mechanic')
    await pullAll(phone.device, phone.cookie)
    expect(await publish(slower(4))).toBe(2)
    expect(told(await pullAll(phone.device, phone.cookie))[0]).toMatchObject({
      versions: [1, 2],
      upTo: 2,
    })
    expect(await publish(otherCheck())).toBe(3)
    expect(told(await pullAll(phone.device, phone.cookie))[0]).toMatchObject({
      versions: [1, 2],
      upTo: 3,
    })
  })

  it('[CB43] lists every job whose verdict it changes, and no other', async () => {
    const rests = await jobWith('mechanic', [wet])
    const putRight = await jobWith('mechanic', [wet], 3)
    const none = await jobWith('mechanic', [{ kind: 'note', words: 'Looked at it.' }])
    const [{ id } = { id: '' }] = await asShop(world.a.id, (tx) => listWithdrawals(tx))
    const jobs = await changedJobs(world.a.id, id)
    expect(jobs?.map(({ jobId }) => jobId)).toEqual([rests])
    expect([putRight, none]).not.toContain(jobs?.[0]?.jobId)
    expect(jobs?.[0]?.before?.name).toBe('Plug wet with fuel')
    expect(jobs?.[0]?.after?.name).toBe('Plug worn')
    expect(await changedJobs(world.b.id, id)).toBeUndefined()
  })

  it('[CB44] a whole version: the last good one before it is published again, and versions only go up', async () => {
    const form: WithdrawForm = { what: 'version', version: 3, reason: 'Wrong rows.', instead: null }
    const made = await withdraw(handOf('owner'), form)
    expect(made).toMatchObject({ ok: true, value: { published: { version: 4 } } })
    const [book, second] = await asShop(world.a.id, async (tx) => [
      await publishedBook(tx),
      await publishedBook(tx, 2),
    ])
    expect(book?.items).toEqual(second?.items)
    expect((await asShop(world.a.id, publishedVersion))?.version).toBe(4)
    const phone = await phoneOf(world.a, 'mechanic')
    const all = told(await pullAll(phone.device, phone.cookie))
    expect(all).toMatchObject([{ versions: [1, 2, 4] }, { what: 'version', versions: [3] }])
    expect(await withdraw(handOf('owner'), form)).toMatchObject({
      problem: { kind: 'withdrawnBefore' },
    })
  })
})
