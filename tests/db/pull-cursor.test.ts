import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { type LogCursor, pullPage } from '@/db/queries/change-log'
import { type Change, takeChanges } from '@/db/queries/changes'
import { appendLogEntries } from '@/db/queries/log-entries'
import { revokeMembership, setRoles } from '@/db/queries/people'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { has, heldOf, makeFullJob, makeFullShop, pullAll } from '../support/pulling-phone'
import { AT, entryOf, makeEntries, makeJob, type TestPerson } from '../support/shop-fixture'

let test: TestDatabase
beforeAll(async () => {
  test = await openTestDatabase()
})
afterAll(() => test.close())

describe('[P12] the cursor', () => {
  it('[P10] a tombstone travels to those who held the row, and a fresh pull knows nothing of it', async () => {
    const shop = await makeFullShop()
    const { mechanic } = shop.people as Record<string, TestPerson>
    const held = await pullAll(shop, { by: mechanic! })
    await asShop(shop.id, async (tx) => {
      await tx.updateTable('machine').set({ deletedAt: AT }).execute()
      await takeChanges(tx, [
        { entity: 'machine', id: shop.machineId, jobId: null, state: 'deleted' },
      ])
    })
    const after = await pullAll(shop, { by: mechanic!, held })
    expect(after.told).toMatchObject([
      { entity: 'machine', id: shop.machineId, state: 'deleted', row: null },
    ])
    expect(has(after, 'machine', shop.machineId)).toBe(false)
    expect(
      (await pullAll(shop, { by: mechanic! })).told.filter((row) => row.entity === 'machine'),
    ).toEqual([])
  })

  it('[P7] moves on over changes that are not for this person', async () => {
    const shop = await makeFullShop()
    const { parts, mechanic } = shop.people as Record<string, TestPerson>
    const held = await pullAll(shop, { by: parts! })
    await makeJob(shop, mechanic!)
    const after = await pullAll(shop, { by: parts!, held })
    expect(after.told).toEqual([])
    expect(after.cursor!.seq).toBe(held.cursor!.seq + 1)
  })

  it('[P7] gives each row once in pages of any size, with the same end', async () => {
    const shop = await makeFullShop()
    const { mechanic } = shop.people as Record<string, TestPerson>
    const job = await makeFullJob(shop, mechanic!)
    await makeEntries(shop, { jobId: job.jobId, by: mechanic!, count: 23 })
    const whole = await pullAll(shop, { by: mechanic! })
    for (const limit of [1, 2, 7]) {
      const paged = await pullAll(shop, { by: mechanic!, limit })
      expect(paged.told).toEqual(whole.told)
      expect(paged.cursor).toEqual(whole.cursor)
    }
    const seqs = whole.told.map((row) => row.seq)
    expect(seqs).toEqual([...seqs].sort((a, b) => a - b))
  })

  it('[P7] ends a page at 256 KB and goes on where it ended', async () => {
    const shop = await makeFullShop()
    const { mechanic } = shop.people as Record<string, TestPerson>
    const jobId = await makeJob(shop, mechanic!)
    const entries = Array.from({ length: 300 }, () =>
      entryOf(jobId, mechanic!, { kind: 'note', words: 'x'.repeat(1900) }),
    )
    await asShop(shop.id, async (tx) => {
      await appendLogEntries(tx, { entries, receivedAt: AT })
      await takeChanges(
        tx,
        entries.map(({ id }): Change => ({ entity: 'logEntry', id, jobId })),
      )
    })
    const first = await asShop(shop.id, (tx) =>
      pullPage(tx, { actor: { personId: mechanic!.id }, cursor: null, limit: 500 }),
    )
    if (first.kind !== 'page') throw new Error(first.kind)
    expect(first.more).toBe(true)
    expect(Buffer.byteLength(JSON.stringify(first.rows))).toBeLessThanOrEqual(257 * 1024)
    const all = await pullAll(shop, { by: mechanic! })
    expect(all.told.filter((row) => row.entity === 'logEntry').length).toBe(300)
  })

  it('[P9] a second pull moves no rows', async () => {
    const shop = await makeFullShop()
    const { mechanic } = shop.people as Record<string, TestPerson>
    await makeFullJob(shop, mechanic!)
    const held = await pullAll(shop, { by: mechanic! })
    expect((await pullAll(shop, { by: mechanic!, held })).told).toEqual([])
  })

  it('[P11] roles that changed start the phone over, with what the new roles hold', async () => {
    const shop = await makeFullShop()
    const { dispatcher, mechanic } = shop.people as Record<string, TestPerson>
    const job = await makeFullJob(shop, mechanic!)
    const held = await pullAll(shop, { by: dispatcher! })
    await asShop(shop.id, async (tx) => {
      await setRoles(tx, { personId: dispatcher!.id, roles: ['parts'] })
      await takeChanges(tx, [{ entity: 'person', id: dispatcher!.id, jobId: null }])
    })
    const page = await asShop(shop.id, (tx) =>
      pullPage(tx, { actor: { personId: dispatcher!.id }, cursor: held.cursor, limit: 500 }),
    )
    expect(page).toEqual({
      kind: 'reset',
      cursor: { ...held.cursor, scopeVersion: held.cursor!.scopeVersion + 1, seq: 0 },
    })
    expect(heldOf(await pullAll(shop, { by: dispatcher! }), job)).toBe(1)
  })

  it('[P11] a membership that ended pulls nothing more', async () => {
    const shop = await makeFullShop()
    const { mechanic } = shop.people as Record<string, TestPerson>
    const held = await pullAll(shop, { by: mechanic! })
    await asShop(shop.id, async (tx) => {
      await revokeMembership(tx, { personId: mechanic!.id, now: AT })
      await takeChanges(tx, [{ entity: 'person', id: mechanic!.id, jobId: null }])
    })
    const page = await asShop(shop.id, (tx) =>
      pullPage(tx, { actor: { personId: mechanic!.id }, cursor: held.cursor, limit: 500 }),
    )
    expect(page).toEqual({ kind: 'signIn' })
  })

  it('[P12] of another epoch, scope or shop, or of the future is answered with a reset', async () => {
    const [shop, other] = [await makeFullShop(), await makeFullShop()]
    const { mechanic } = shop.people as Record<string, TestPerson>
    const { cursor } = await pullAll(shop, { by: mechanic! })
    const answer = async (wrong: Partial<LogCursor>) => {
      const page = await asShop(shop.id, (tx) =>
        pullPage(tx, {
          actor: { personId: mechanic!.id },
          cursor: { ...cursor!, ...wrong },
          limit: 500,
        }),
      )
      return page.kind
    }
    expect(await answer({})).toBe('page')
    expect(await answer({ epoch: 'another' })).toBe('reset')
    expect(await answer({ shop: other.id })).toBe('reset')
    expect(await answer({ seq: cursor!.seq + 1 })).toBe('reset')
    expect(await answer({ scopeVersion: 9 })).toBe('reset')
  })
})
