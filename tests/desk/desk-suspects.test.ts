import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { DeskSuspects } from '@/components/desk/job/desk-suspects'
import type { JobCase } from '@/components/desk/job/use-job-case'
import { BOOK_ITEMS } from '@/db/codebook/book'
import type { Suspect } from '@/lib/diag/belief'
import { indexBook, SOMETHING_ELSE } from '@/lib/diag/book-index'
import type { DeskJob } from '@/lib/model/desk'

const suspect = (i: number): Suspect => ({
  fault: `fault${i}`,
  name: `Fault ${i}`,
  chance: 0.2 - i * 0.01,
  prior: 0.1,
  ruledOutBy: null,
  why: [],
})
/** Fourteen suspects; "something else" is the twelfth, and the last five are under 3 of 100. */
const suspects: Suspect[] = [
  ...Array.from({ length: 9 }, (_, i) => suspect(i + 1)),
  { ...suspect(10), chance: 0.02 },
  { ...suspect(11), chance: 0.015 },
  { ...suspect(12), fault: SOMETHING_ELSE, name: 'Something else', chance: 0.012 },
  { ...suspect(13), chance: 0.01 },
  { ...suspect(14), chance: 0.005 },
]
const reckoned = {
  index: indexBook({
    version: 2,
    hash: 'x',
    publishedAt: '2026-11-24T18:00:00.000Z',
    items: BOOK_ITEMS,
  }),
  newerSeen: null,
  answer: { belief: { suspects, notices: [] } },
  working: false,
  failed: false,
} as unknown as JobCase

const shown = (more: Partial<JobCase> = {}, symptom: string | null = 'startsThenDies') =>
  renderToStaticMarkup(
    createElement(DeskSuspects, {
      found: { job: { complaint: { symptom } }, entries: [] } as unknown as DeskJob,
      reckoned: { ...reckoned, ...more },
    }),
  )
const rowOf = (page: string, fault: string) =>
  new RegExp(`<li data-row="${fault}".*?</li>`).exec(page)?.[0].replace(/<[^>]*>/g, '|')

describe('[F5] the suspects at the desk', () => {
  it('[F5] each stands at the place it has among all, folded or not', () => {
    const page = shown()
    expect(rowOf(page, 'fault9')).toMatch(/\|9\|+Fault 9/)
    expect(rowOf(page, SOMETHING_ELSE)).toMatch(/\|12\|+Something else/)
  })

  it('[R5] ranks nothing before anybody has said what the machine does', () => {
    const page = shown({}, null)
    expect(page).toContain('Nobody has said yet what it does')
    expect(page).not.toContain('data-row')
  })

  it('[F5] there is one fold, which counts all that it hides', () => {
    const page = shown()
    expect(page.match(/aria-expanded/g)).toHaveLength(1 + rowsWithWhy(page))
    expect(page).toContain('4 more, each 2 of 100 or less')
    expect(page).not.toContain('Show all')
  })

  it('[F5] a proof run that rules out all the others at once does not fill the page with them', () => {
    const out = (i: number) => ({ ...suspect(i), chance: 0.001, ruledOutBy: 'proof' })
    const after = [suspect(1), ...Array.from({ length: 20 }, (_, i) => out(i + 2))]
    const belief = { suspects: after, notices: [] }
    const page = shown({ answer: { belief } as unknown as JobCase['answer'] })
    expect(page.match(/<li data-row/g)).toHaveLength(1 + 4)
    expect(rowOf(page, 'fault5')).toContain('ruled out by')
    expect(page).toContain('16 more, each 1 of 100 or less')
  })

  it('[R23] says the code book version, and when an entry was written with a newer one', () => {
    expect(shown()).toContain('Worked out here with code book version 2.')
    expect(shown({ newerSeen: 3 })).toContain(
      'An entry was written with code book version 3; this is worked out with version 2.',
    )
  })
})

const rowsWithWhy = (page: string) => (page.match(/<li /g) ?? []).length
