import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getBook } from '@/app/api/codebook/route'
import { GET as getHealth } from '@/app/api/health/route'
import { GET as getMe, POST as postMe } from '@/app/api/me/route'
import { asShop, switchDatabase } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { publishBook } from '@/db/queries/code-book'
import type { CodeBook, CodeBookItem } from '@/lib/model/code-book'
import { openSyncWorld, problemOf, type SyncWorld, signIn } from '../support/sync-world'

let world: SyncWorld
let cookie: string
beforeAll(async () => {
  world = await openSyncWorld()
  cookie = (await signIn(world.a, 'guide')).cookie
})
afterAll(() => world.close())

const item = (name: string): CodeBookItem => ({
  kind: 'part',
  id: 'ignitionCoil',
  name,
  source: 'from memory',
})
const publish = (version: number, name: string) =>
  asShop(world.a.id, async (tx) => {
    const at = '2026-11-24T18:40:00.000Z'
    const made = await publishBook(tx, {
      version,
      items: [item(name)],
      publishedAt: at,
      publishedBy: null,
    })
    await takeChanges(tx, [{ entity: 'book', id: String(version), jobId: null }])
    return made
  })
const book = (query = '', headers: Record<string, string> = { cookie }) =>
  getBook(new Request(`http://shop.invalid/api/codebook${query}`, { headers }))

describe('GET /api/codebook', () => {
  it('[F11] answers the newest version, any older one for good, and 304 to who holds it', async () => {
    expect((await book()).status).toBe(404)
    const first = await publish(1, 'Coil')
    const second = await publish(2, 'Ignition coil')
    const newest = await book()
    expect(newest.headers.get('etag')).toBe(`"${second.hash}"`)
    expect(newest.headers.get('cache-control')).toBe('private, no-cache')
    expect((await newest.json()) as CodeBook).toEqual({ ...second, items: [item('Ignition coil')] })
    const old = await book('?version=1')
    expect(old.headers.get('cache-control')).toContain('immutable')
    expect((await old.json()) as CodeBook).toEqual({ ...first, items: [item('Coil')] })
    for (const tag of [`"${second.hash}"`, `W/"${second.hash}"`, `"x", "${second.hash}"`]) {
      const held = await book('', { cookie, 'if-none-match': tag })
      expect(held.status).toBe(304)
      expect(await held.text()).toBe('')
    }
    expect((await book('', { cookie, 'if-none-match': `"${first.hash}"` })).status).toBe(200)
  })

  it('[P11] answers nothing without a session, of another shop, or for a version that is none', async () => {
    expect(await problemOf(await book('', {}))).toMatchObject({ status: 401, kind: 'signIn' })
    expect((await book('', { cookie: (await signIn(world.b, 'owner')).cookie })).status).toBe(404)
    for (const version of ['3', '0', '-1', '1.5', 'x', '99999999999', '']) {
      expect((await book(`?version=${version}`)).status).toBe(404)
    }
  })
})

describe('who and whether', () => {
  it('[P18] says who is signed in, and nobody else', async () => {
    const answer = await getMe(new Request('http://shop.invalid/api/me', { headers: { cookie } }))
    const guide = world.a.people.guide
    expect(await answer.json()).toEqual({
      shopId: world.a.id,
      personId: guide?.id,
      roles: ['guide'],
      name: guide?.name,
    })
    expect(answer.headers.get('cache-control')).toBe('no-store')
    expect((await getMe(new Request('http://shop.invalid/api/me'))).status).toBe(401)
    expect(postMe().status).toBe(405)
  })

  it('[P16] is healthy with its database and asks to come back without it', async () => {
    const well = await getHealth()
    expect(await well.json()).toMatchObject({ ok: true, build: expect.stringMatching(/./) })
    const nowhere = new URL(world.db.appUrl)
    nowhere.port = '1'
    await switchDatabase(nowhere.href)
    const answers = [
      await getHealth(),
      await getMe(new Request('http://shop.invalid/api/me', { headers: { cookie } })),
    ]
    await switchDatabase(world.db.appUrl)
    for (const answer of answers) {
      expect(answer.headers.get('retry-after')).toBe('5')
      expect(await problemOf(answer)).toMatchObject({ status: 503, kind: 'busy' })
    }
    expect((await getHealth()).status).toBe(200)
  })
})
