import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { bookHash, publishedBook } from '@/db/queries/code-book'
import { bookCommand } from '../../scripts/codebook'
import { smallRightBook } from '../support/book-fixture'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { makeShop, type TestShop } from '../support/shop-fixture'

let test: TestDatabase
let shop: TestShop
let folder: string
beforeAll(async () => {
  test = await openTestDatabase()
  shop = await makeShop({ owner: ['owner'], guide: ['guide'] })
  folder = mkdtempSync(join(tmpdir(), 'farbench-book-'))
})
afterAll(async () => {
  rmSync(folder, { recursive: true, force: true })
  await test.close()
})

const run = async (name: string, ...args: string[]) => {
  const done = await bookCommand(name, args)
  return done.ok ? { code: 0, said: done.value } : { code: 1, said: done.problem }
}
const as = (who: string) => ['--as', shop.people[who]?.email ?? '']

describe('[CB35] the commands', () => {
  it('[CB35] import, publish, export as JSON and CSV, change a cell, import again', async () => {
    const items = smallRightBook()
    const file = join(folder, 'book.json')
    writeFileSync(file, JSON.stringify({ farbenchCodeBook: 1, items, unseparated: [] }))
    expect(await run('import', file, ...as('owner'))).toEqual({
      code: 0,
      said: `Draft of ${items.length} items, ${bookHash(items).slice(0, 12)}. Nothing hinders its publishing.`,
    })
    expect(await run('publish', ...as('owner'))).toEqual({
      code: 0,
      said: 'Version 1 is published.',
    })

    const again = join(folder, 'again.json')
    expect((await run('export', '--json', again, ...as('owner'))).code).toBe(0)
    expect(JSON.parse(readFileSync(again, 'utf8'))).toMatchObject({ version: 1, items })

    const csv = join(folder, 'csv')
    expect((await run('export', '--csv', csv, ...as('owner'))).said).toContain(
      `${items.length} items`,
    )
    const setups = join(csv, 'setup.csv')
    const text = readFileSync(setups, 'utf8')
    writeFileSync(setups, text.replace('Seat off,2', 'Seat off,two'))
    expect(await run('import', csv, ...as('owner'))).toEqual({
      code: 1,
      said: 'setup.csv, line 2, column 4: “minutes” is not written as JSON writes it.',
    })
    writeFileSync(setups, text.replace('Seat off,2', 'Seat off,3'))
    expect((await run('import', csv, '--note', 'Slower', ...as('owner'))).code).toBe(0)
    expect((await run('publish', ...as('owner'))).said).toBe('Version 2 is published.')
    const book = await asShop(shop.id, (tx) => publishedBook(tx))
    expect(book?.items).toEqual(
      items.map((item) => (item.kind === 'setup' ? { ...item, minutes: 3 } : item)),
    )
  })

  it('[CB35] refuse with findings by file and line, without a draft, and those who may not', async () => {
    const items = smallRightBook().filter(({ kind }) => kind !== 'tool')
    const file = join(folder, 'broken.json')
    writeFileSync(file, JSON.stringify({ farbenchCodeBook: 1, items, unseparated: [] }, null, 1))
    const taken = await run('import', file, ...as('owner'))
    expect(taken.said).toMatch(/^broken\.json, line \d+, column \d+: unresolved: lookAtPlug: /)
    expect(await run('publish', ...as('owner'))).toMatchObject({
      code: 1,
      said: expect.stringContaining('Not published: the book has to be right first.'),
    })
    expect((await run('publish', ...as('guide'))).said).toBe(
      'The roles of this person do not allow it.',
    )
    expect((await run('export', ...as('owner'))).said).toBe(
      'Say where to: --json FILE or --csv DIR.',
    )
  })
})
