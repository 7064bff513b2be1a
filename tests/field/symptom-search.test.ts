import { expect, test } from 'vitest'
import { SymptomSearch } from '@/components/field/symptom-search'
import { BOOK_ITEMS } from '@/db/codebook/book'
import type { SymptomItem } from '@/lib/model/code-book'

const [dies] = BOOK_ITEMS.filter((item) => item.kind === 'symptom')
const other = (id: string, over: Partial<SymptomItem>): SymptomItem => ({
  ...(dies as SymptomItem),
  id,
  name: id,
  riderWords: [],
  ...over,
})
const search = new SymptomSearch(
  [
    other('startsThenDies', { name: 'Starts, then dies', riderWords: ['conks out', 'stalls'] }),
    other('noCrank', { name: 'Does not turn over', riderWords: ['just clicks', "won't crank"] }),
    other('trackOff', { name: 'Track off', gate: { kind: ['snowmobile'] } }),
  ],
  { kind: 'atv' },
)
const found = (wanted: string) => search.find(wanted).map(({ id }) => id)

test('[F1] a complaint is found in the middle of what a rider says', () => {
  expect(found('it just conks out on the hill')).toEqual(['startsThenDies'])
  expect(found('I turn the key and it just clicks')[0]).toBe('noCrank')
})

test('[F1] half a word, a slip of the thumb and a missing apostrophe find it too', () => {
  expect(found('sta')).toContain('startsThenDies')
  expect(found('stals')).toContain('startsThenDies')
  expect(found('wont crank')).toEqual(['noCrank'])
})

test('[F1] words that say nothing find nothing', () => {
  expect(found('it is not')).toEqual([])
  expect(found('')).toEqual([])
})

test('[R4] what the machine cannot do is not offered', () => {
  expect(found('track')).toEqual([])
  expect(search.all.map(({ id }) => id)).toEqual(['startsThenDies', 'noCrank'])
})
