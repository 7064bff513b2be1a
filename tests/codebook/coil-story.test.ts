import { beforeAll, expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'

const COIL_GROUP = [
  'ignitionCoilPart',
  'ignitionCoilWiring',
  'ignitionCoilDriver',
  'ignitionCoilSupply',
]
const code: LogBody = {
  kind: 'code',
  seen: { format: 'spn', spn: 1268, fmi: 3 },
  context: { module: 0, status: 'active', count: null, order: 1, photo: null },
}
const swap = (step: 'spareFitted' | 'oldRefitted', faultPresent: boolean): LogBody => ({
  kind: 'swap',
  swapId: 'coilSwap',
  step,
  faultPresent,
  partFrom: 'bag',
  partWords: null,
})

let index: ReturnType<typeof indexBook>
beforeAll(() => {
  index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
})

function of100(bodies: LogBody[]): Map<string, number> {
  const model = DEMO_MODELS[0]!
  const entries = bodies.map((body, n): LogEntry => {
    const at = `2026-01-14T10:0${n}:00.000Z`
    return {
      id: `01980000-0000-7000-8000-00000000090${n}`,
      jobId: '01980000-0000-7000-8000-000000000900',
      supersedes: null,
      happenedAt: at,
      writtenAt: at,
      zone: 'Etc/UTC',
      authorId: '01980000-0000-7000-8000-000000000101',
      deviceId: '01980000-0000-7000-8000-000000000601',
      engineVersion: '1',
      bookVersion: 1,
      body,
    }
  })
  const complaint = { words: 'starts then dies', symptom: 'startsThenDies', lampOn: true }
  const c = buildCase({
    index,
    features: model.features,
    spec: model.specSheet,
    job: { complaint },
    entries,
  })
  return new Map(belief(c).suspects.map((s) => [s.fault, 100 * s.chance]))
}

test('[R5] before the code the coil is one suspect of many', () => {
  const chances = of100([])
  expect(chances.get('ignitionCoilPart')).toBeGreaterThan(3)
  expect(chances.get('ignitionCoilPart')).toBeLessThan(8)
  expect([...chances.values()].filter((p) => p > 3).length).toBeGreaterThan(10)
})

test('[R5] after SPN 1268 FMI 3 part, wiring and driver of the coil lead, supply is argued against', () => {
  const [first, second, third] = of100([code]).keys()
  expect([first, second, third]).toEqual(COIL_GROUP.slice(0, 3))
  expect(of100([code]).get('ignitionCoilSupply')).toBeLessThan(3)
})

test('[R5] once gone is not proof: wiring stays a suspect; gone and back puts the coil above 90 of 100', () => {
  const once = of100([code, swap('spareFitted', false)])
  expect(once.get('ignitionCoilWiring')).toBeGreaterThan(10)
  expect(once.get('ignitionCoilPart')).toBeLessThan(90)
  const back = of100([code, swap('spareFitted', false), swap('oldRefitted', true)])
  expect(back.get('ignitionCoilPart')).toBeGreaterThan(90)
})

test('[R5] a good coil that changes nothing sends the search to driver and wiring', () => {
  const chances = of100([code, swap('spareFitted', true)])
  expect(chances.get('ignitionCoilPart')).toBeLessThan(10)
  expect([...chances.keys()].slice(0, 2).sort()).toEqual([
    'ignitionCoilDriver',
    'ignitionCoilWiring',
  ])
})
