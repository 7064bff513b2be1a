import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as exportFile } from '@/app/api/desk/codebook/export/route'
import { POST as importFiles } from '@/app/api/desk/codebook/import/route'
import { GET as readBooks } from '@/app/api/desk/codebook/route'
import { GET as readJobs } from '@/app/api/desk/codebook/withdrawals/[id]/route'
import { GET as readNames } from '@/app/api/desk/codebook/withdrawals/route'
import { bookSentence } from '@/components/desk/codebook/book-actions'
import { countWords, findingLine, sinceLines } from '@/components/desk/codebook/book-words'
import { readBookJson } from '@/db/codebook/file-json'
import {
  bookImported,
  changedJobsAnswer,
  deskBook,
  withdrawableAnswer,
} from '@/lib/model/book-desk'
import { publishDraft } from '@/lib/sync/server/book/publish-draft'
import { withdraw } from '@/lib/sync/server/book/withdraw'
import { smallRightBook } from '../support/book-fixture'
import { newId } from '../support/shop-fixture'
import { openSyncWorld, problemOf, type SyncWorld, signIn } from '../support/sync-world'

let world: SyncWorld
let cookie: string
beforeAll(async () => {
  world = await openSyncWorld()
  cookie = (await signIn(world.a, 'owner')).cookie
})
afterAll(() => world.close())

const items = smallRightBook()
const hand = () => {
  const owner = world.a.people.owner
  const actor = { shopId: world.a.id, personId: owner?.id ?? '', roles: owner?.roles ?? [] }
  return { actor, now: Date.now(), newId }
}
const request = (path: string, by: string, body?: unknown) =>
  new Request(`http://shop.invalid/api/desk/codebook${path}`, {
    headers: { cookie: by },
    ...(body === undefined ? {} : { method: 'POST', body: JSON.stringify(body) }),
  })
const withId = (id: string) => ({ params: Promise.resolve({ id }) })
const json = (of: unknown[]) => JSON.stringify({ farbenchCodeBook: 1, items: of, unseparated: [] })
const take = async (files: { name: string; text: string }[], replace = false) =>
  importFiles(request('/import', cookie, { files, note: 'By file', replace }))
const books = async () => deskBook.parse(await (await readBooks(request('', cookie))).json())

describe('[CB45] the owner’s code book', () => {
  it('[CB45] is the owner’s alone, at every address', async () => {
    for (const who of ['mechanic', 'guide', 'dispatcher', 'parts']) {
      const other = (await signIn(world.a, who)).cookie
      const answers = [
        await readBooks(request('', other)),
        await exportFile(request('/export', other)),
        await importFiles(request('/import', other, { files: [], note: null, replace: false })),
        await readNames(request('/withdrawals', other)),
        await readJobs(request('/withdrawals/x', other), withId(newId())),
      ]
      for (const answer of answers)
        expect(await problemOf(answer)).toMatchObject({ status: 403, kind: 'forbidden' })
    }
    expect((await readBooks(request('', ''))).status).toBe(401)
  })

  it('[CB45] takes a file as the draft, says what hinders it, and keeps the one there is', async () => {
    const wrong = bookImported.parse(
      await (await take([{ name: 'book.json', text: '{"farbenchCodeBook": 1,}' }])).json(),
    )
    expect(wrong.taken).toBeNull()
    expect(wrong.problems[0]).toMatchObject({ file: 'book.json', line: 1 })
    const broken = items.filter(({ kind }) => kind !== 'tool')
    const found = bookImported.parse(
      await (await take([{ name: 'book.json', text: json(broken) }])).json(),
    )
    expect(found.taken?.items).toBe(broken.length)
    expect(found.findings[0]).toMatchObject({ id: 'lookAtPlug', place: { file: 'book.json' } })
    const again = await take([{ name: 'book.json', text: json(items) }])
    expect(await problemOf(again)).toMatchObject({ status: 409 })
    expect((await take([{ name: 'book.json', text: json(items) }], true)).status).toBe(200)
    const { versions } = await books()
    expect(versions).toMatchObject([{ version: null, state: 'draft', note: 'By file' }])
    expect(versions[0]?.madeBy?.id).toBe(world.a.people.owner?.id)
  })

  it('[CB45] lists versions with state, counts, sources and what changed', async () => {
    await publishDraft(hand())
    const slower = items.map((item) => (item.kind === 'setup' ? { ...item, minutes: 9 } : item))
    await take([{ name: 'book.json', text: json(slower) }])
    await publishDraft(hand())
    const form = { what: 'version', version: 2, reason: 'Too slow.', instead: null } as const
    await withdraw(hand(), form)
    const { versions, withdrawals } = await books()
    expect(versions.map(({ version, state }) => [version, state])).toEqual([
      [3, 'published'],
      [2, 'withdrawn'],
      [1, 'published'],
    ])
    expect(versions[1]?.since).toEqual({
      version: 1,
      added: [],
      changed: ['setup seatOff'],
      gone: [],
    })
    expect(versions[0]?.since).toMatchObject({ version: 1, changed: [] })
    expect(versions[0]?.counts).toMatchObject({ check: 1, fault: 2 })
    expect(versions[0]?.sources).toContain('common practice, no source')
    expect(withdrawals).toMatchObject([{ what: 'version', versions: [2] }])
    const id = withdrawals[0]?.id ?? ''
    const jobs = await readJobs(request(`/withdrawals/${id}`, cookie), withId(id))
    expect(changedJobsAnswer.parse(await jobs.json()).jobs).toEqual([])
    expect((await readJobs(request('/withdrawals/x', cookie), withId('x'))).status).toBe(404)
  })

  it('[CB45] offers by name what may be withdrawn, and what was withdrawn no more', async () => {
    const names = async () =>
      withdrawableAnswer.parse(await (await readNames(request('/withdrawals', cookie))).json())
        .items
    const before = await names()
    expect(before.filter(({ what }) => what !== 'fault')).toEqual([
      { what: 'check', id: 'lookAtPlug', name: 'Look at the plug' },
    ])
    expect(before.filter(({ what }) => what === 'fault')).toHaveLength(2)
    const of = { what: 'check', itemId: 'lookAtPlug' } as const
    expect(await withdraw(hand(), { ...of, reason: 'May burn.', instead: null })).toMatchObject({
      ok: true,
    })
    expect(await names()).toEqual(before.filter(({ what }) => what === 'fault'))
  })

  it('[CB45] hands out every version as JSON and each kind as CSV', async () => {
    const whole = await exportFile(request('/export?version=2', cookie))
    expect(whole.headers.get('content-disposition')).toContain('codebook-2.json')
    const read = readBookJson(await whole.text(), 'codebook-2.json')
    expect(read.ok && read.value.book.items.find(({ kind }) => kind === 'setup')).toMatchObject({
      minutes: 9,
    })
    const setups = await exportFile(request('/export?kind=setup', cookie))
    expect(await setups.text()).toContain('seatOff,Seat off,2')
    for (const query of ['?version=9', '?version=x', '?version=draft', '?kind=job'])
      expect((await exportFile(request(`/export${query}`, cookie))).status).toBe(404)
  })
})

describe('[CB45] in words', () => {
  it('[CB45] counts what people count, and names what changed', () => {
    expect(countWords({ check: 2, fault: 1, part: 9 })).toBe('1 fault, 2 checks')
    const none = { version: 3, added: [], changed: [], gone: [] }
    expect(sinceLines(none)).toEqual(['The same as version 3.'])
    const many = Array.from({ length: 9 }, (_, n) => `check c${n}`)
    expect(sinceLines({ ...none, changed: many })[0]).toMatch(
      /^Changed since version 3 \(9\): check c0, .* and 1 more\.$/,
    )
    const place = { file: 'book.json', line: 4, column: 2 }
    expect(findingLine({ kind: 'orphan', id: 'x', words: 'unused', place })).toBe(
      'book.json, line 4, column 2: x: unused',
    )
    expect(bookSentence({ kind: 'findings', findings: [] })).toContain('Not published')
  })
})
