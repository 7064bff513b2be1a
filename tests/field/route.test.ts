import { describe, expect, test } from 'vitest'
import { backOf, isForm, jobHref, routeOf } from '@/components/field/route'

const parts = (href: string) =>
  href
    .split('?')[0]!
    .split('/')
    .filter((part) => part !== '')
    .slice(1)

describe('[F14] addresses of the field', () => {
  test.each([
    ['/field', { name: 'jobs' }],
    ['/field/', { name: 'jobs' }],
    ['/field/new', { name: 'new' }],
    ['/field/unsent', { name: 'unsent' }],
    ['/field/about', { name: 'about' }],
    ['/field/jobs', { name: 'jobs' }],
    ['/field/jobs/j', { name: 'job', jobId: 'j' }],
    ['/field/jobs/j/checks', { name: 'checks', jobId: 'j' }],
    ['/field/jobs/j/checks/c', { name: 'check', jobId: 'j', checkId: 'c' }],
    ['/field/jobs/j/checks/c/reading', { name: 'reading', jobId: 'j', checkId: 'c' }],
    ['/field/jobs/j/swap/s', { name: 'swap', jobId: 'j', swapId: 's' }],
    ['/field/jobs/j/codes', { name: 'codes', jobId: 'j' }],
    ['/field/jobs/j/fix', { name: 'fix', jobId: 'j' }],
    ['/field/jobs/j/proof', { name: 'proof', jobId: 'j' }],
    ['/field/jobs/j/wayout', { name: 'wayOut', jobId: 'j' }],
    ['/field/jobs/j/log', { name: 'log', jobId: 'j' }],
    ['/field/jobs/j/log/e', { name: 'entry', jobId: 'j', entryId: 'e' }],
    ['/field/jobs/j/log/e/correct', { name: 'correct', jobId: 'j', entryId: 'e' }],
    ['/field/jobs/j/note', { name: 'note', jobId: 'j' }],
    ['/field/jobs/j/symptom', { name: 'symptom', jobId: 'j' }],
    ['/field/jobs/j/photo', { name: 'photo', jobId: 'j' }],
    ['/field/jobs/j/voice', { name: 'voice', jobId: 'j' }],
    ['/field/jobs/j/parts', { name: 'parts', jobId: 'j' }],
    ['/field/jobs/j/parts/ask?part=p', { name: 'askPart', jobId: 'j' }],
    ['/field/jobs/j/sheet', { name: 'sheet', jobId: 'j' }],
    ['/field/jobs/j/place', { name: 'setPlace', jobId: 'j' }],
    ['/field/jobs/j/air', { name: 'setAir', jobId: 'j' }],
    ['/field/jobs/j/complaint', { name: 'setComplaint', jobId: 'j' }],
    ['/field/jobs/j/machine', { name: 'setMachine', jobId: 'j' }],
    ['/field/nowhere', { name: 'unknown' }],
    ['/field/new/more', { name: 'unknown' }],
    ['/field/toString', { name: 'unknown' }],
    ['/field/jobs/j/swap', { name: 'unknown' }],
    ['/field/jobs/j/checks/c/other', { name: 'unknown' }],
    ['/field/jobs/j/constructor', { name: 'unknown' }],
  ])('%s', (href, route) => {
    expect(routeOf(parts(href))).toEqual(route)
  })

  test('Back leads one level up and ends at the jobs', () => {
    const ways = ['', 'codes', 'checks/c/reading', 'checks/c', 'log/e/correct', 'parts/ask', 'note']
    for (const screen of ways) {
      let href: string | null = jobHref('j', screen)
      for (let steps = 0; href !== null; steps += 1) {
        expect(steps).toBeLessThan(5)
        href = backOf(routeOf(parts(href)))?.href ?? null
      }
    }
    expect(backOf(routeOf(parts('/field/jobs/j/checks/c/reading')))?.href).toBe(
      '/field/jobs/j/checks/c',
    )
    expect(backOf(routeOf(['unsent']))?.href).toBe('/field')
    expect(backOf(routeOf([]))).toBeNull()
  })

  test('a newer version is not offered over something half written', () => {
    expect(isForm(routeOf(['new']))).toBe(true)
    expect(isForm(routeOf(parts('/field/jobs/j/note')))).toBe(true)
    expect(isForm(routeOf(parts('/field/jobs/j/log')))).toBe(false)
    expect(isForm(routeOf([]))).toBe(false)
  })
})
