import { describe, expect, it } from 'vitest'
import { boardNews } from '@/components/desk/board/board-news'
import { reads, staleReads } from '@/components/desk/live/stale-reads'
import { adviceWords } from '@/components/desk/parts/advice-words'
import {
  lineBoxes,
  lineMoveForm,
  minorOf,
  moveOnEnter,
  priceText,
} from '@/components/desk/parts/line-move.schema'
import { homeOf, pathAskedFor } from '@/components/sign-in/home-of'
import type { BoardJob, DeskBoard } from '@/lib/model/desk'
import { currencyPlaces } from '@/lib/shop/currency'

const change = (entity: string, jobId: string | null = 'j1') => ({ seq: 4, entity, id: 'x', jobId })

describe('what a change makes stale', () => {
  it.each([
    ['job', 'j1', [reads.board, reads.job('j1')]],
    ['logEntry', 'j1', [reads.board, reads.job('j1')]],
    ['photo', 'j1', [reads.board, reads.job('j1')]],
    ['partRequest', 'j1', [reads.board, reads.parts, reads.job('j1')]],
    ['machine', null, [reads.board, reads.jobs, reads.parts]],
    ['bag', null, []],
    ['book', null, [reads.book]],
    ['person', null, [reads.all]],
    ['somethingNew', null, [reads.all]],
  ])(
    '[R19] %s: no more than it touches, and everything when it is not known',
    (entity, job, stale) => {
      expect(staleReads(change(entity, job))).toEqual(stale)
    },
  )
})

const row = (id: string, more: Partial<BoardJob> = {}): BoardJob =>
  ({
    job: { id, number: `J-${id}`, state: 'open', complaint: { words: 'Dies' } },
    machineWords: 'Unit 14',
    entries: 2,
    closedAt: null,
    heardAt: null,
    photosMissing: 0,
    partsOpen: 0,
    ...more,
  }) as BoardJob
const board = (open: BoardJob[], closed: BoardJob[] = []): DeskBoard => ({
  seq: 1,
  whose: 'all',
  open,
  closed,
})

describe('the news of the board', () => {
  it('[R19] tells a job that came, entries, parts, a photo and a closing; nothing when nothing changed', () => {
    const before = board([row('1'), row('2', { photosMissing: 1 }), row('3')])
    expect(boardNews(before, before)).toEqual([])
    const closed = row('3')
    const after = board(
      [row('1', { entries: 5, partsOpen: 1 }), row('2', { photosMissing: 0 }), row('4')],
      [{ ...closed, job: { ...closed.job, state: 'closed' } }],
    )
    expect(boardNews(before, after)).toEqual([
      '3 new entries on J-1.',
      'Parts asked for on J-1.',
      'A photo or voice note of J-2 arrived.',
      'J-4 came onto the board: Dies, Unit 14.',
      'J-3 closed.',
    ])
  })
})

describe('the boxes of a part line', () => {
  it.each([
    ['135.00', 13_500],
    ['135,00', 13_500],
    ['25', 2_500],
    ['0.05', 5],
    ['', null],
  ])('[R14] reads the price %s', (typed, minor) => {
    expect(lineBoxes(2).safeParse({ number: '', price: typed }).success).toBe(true)
    expect(minorOf(typed, 2)).toBe(minor)
  })

  it.each([
    ['JPY', '13500', 13_500, '135.00'],
    ['KWD', '1.250', 1_250, '1.25'],
    ['USD', '1.25', 125, '1.250'],
  ])('[R14] a price in %s has the decimals of the currency', (currency, typed, minor, wrong) => {
    const places = currencyPlaces(currency)
    const fits = (price: string) => lineBoxes(places).safeParse({ number: '', price }).success
    expect([fits(typed), fits(wrong)]).toEqual([true, false])
    expect(minorOf(typed, places)).toBe(minor)
    expect(priceText(minor, places)).toBe(typed)
  })

  it.each(['-1', '1.5', '1.234', '12 345', 'abc', '99999999'])(
    '[R14] refuses the price %s',
    (typed) => {
      expect(lineBoxes(2).safeParse({ number: '', price: typed }).success).toBe(false)
    },
  )

  it.each([
    ['', { identified: true, quoted: true }, 'identified'],
    ['135.00', { identified: true, quoted: true }, 'quoted'],
    ['', { identified: false, quoted: true }, 'quoted'],
    ['135.00', { identified: true, quoted: false }, 'identified'],
    ['135.00', { identified: false, quoted: false }, null],
  ] as const)('[R14] Enter with the price %j where %j is open means %s', (price, can, to) => {
    expect(moveOnEnter(price, can)).toBe(to)
  })

  it('[R14] takes no move but identified, quoted and cancelled, and no field it does not know', () => {
    const head = {
      requestId: '01980000-0000-7000-8000-0000000000a1',
      lineId: '01980000-0000-7000-8000-0000000000a2',
      from: 'asked',
    }
    expect(lineMoveForm.safeParse({ ...head, to: 'identified', number: 'K-1' }).success).toBe(true)
    expect(lineMoveForm.safeParse({ ...head, to: 'identified', number: ' ' }).success).toBe(false)
    expect(
      lineMoveForm.safeParse({ ...head, to: 'quoted', number: null, priceMinor: -1 }).success,
    ).toBe(false)
    expect(lineMoveForm.safeParse({ ...head, to: 'ordered' }).success).toBe(false)
    expect(lineMoveForm.safeParse({ ...head, to: 'cancelled', shopId: head.lineId }).success).toBe(
      false,
    )
  })

  it('[F8] shows the advice as it was asked with: break-even 38.7 of 100 for 135 against 25 at 300', () => {
    // Issue story step 7: 0.02 + (135 - 25) / 300 = 0.38667.
    const words = adviceWords(
      {
        genuineMinor: 13_500,
        aftermarketMinor: 2_500,
        recoveryMinor: 30_000,
        genuineFails: 0.02,
        aftermarketFails: 0.12,
        breakEven: 0.02 + 110 / 300,
        advised: 'aftermarket',
      },
      'USD',
    )
    expect(words.first).toBe(
      'Aftermarket advised. Break-even: the aftermarket part pays until 38.7 of 100 fail.',
    )
    expect(words.from).toBe(
      'Genuine 135.00 USD, fails 2 of 100. Aftermarket 25.00 USD. Aftermarket fails 12 of 100. Second recovery 300.00 USD.',
    )
  })
})

describe('after signing in', () => {
  it.each([
    [['mechanic'], '/field'],
    [['guide'], '/field'],
    [['mechanic', 'guide'], '/field'],
    [['dispatcher'], '/desk'],
    [['parts'], '/desk/parts'],
    [['mechanic', 'parts'], '/desk'],
    [['owner'], '/desk'],
  ] as const)('[R22] %s begin at %s', (roles, home) => {
    expect(homeOf(roles)).toBe(home)
  })

  it.each([
    ['?to=/desk/parts', '/desk/parts'],
    [
      '?to=/field/jobs/01980000-0000-7000-8000-000000000001',
      '/field/jobs/01980000-0000-7000-8000-000000000001',
    ],
    ['?to=https://elsewhere.invalid/desk', null],
    ['?to=//elsewhere.invalid', null],
    ['?to=/desk/../api/me', null],
    ['?to=/desk\\elsewhere', null],
    ['?to=/deskelsewhere', null],
    ['', null],
  ])('[R22] %s goes to %s', (search, path) => {
    expect(pathAskedFor(search)).toBe(path)
  })
})
