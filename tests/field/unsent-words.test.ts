import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { isAllHanded } from '@/components/field/phone/hand-over'
import { handedWords, letGoWords } from '@/components/field/phone/let-go-words'
import { makeFiles } from '@/components/field/phone/save-files'
import { standing, titleOf } from '@/components/field/phone/unsent-words'
import { countNews } from '@/components/field/shell'
import { WitnessMark } from '@/components/ui/witness-mark'
import { NOTHING_UNSENT } from '@/lib/sync/client/unsent'
import type { UnsentItem, UnsentView } from '@/lib/sync/client/views'

const item = (state: UnsentItem['state'], key: string): UnsentItem => ({
  key,
  opId: key,
  hash: null,
  kind: 'log.add',
  jobId: null,
  what: 'Note',
  bytes: 100,
  bytesDone: 0,
  since: '2026-11-24T18:00:00.000Z',
  state,
  waitsFor: null,
  reason: null,
  code: null,
  words: null,
})
const view = (more: Partial<UnsentView>): UnsentView => ({
  ...NOTHING_UNSENT,
  counted: true,
  ...more,
  count: more.items?.length ?? 0,
})

describe('[P23] what is said of unsent work is true', () => {
  it('[P23] all sent only when nothing was let go', () => {
    expect(titleOf(view({}))).toBe('All sent')
    expect(standing(view({}), false)).toBe('Everything you recorded here is at the shop.')
    for (const given of [view({ letGoCount: 1 }), view({ filesLetGo: 1 })]) {
      expect(titleOf(given)).toBe('Nothing waits')
      expect(standing(given, false)).toContain('but for 1 thing let go')
    }
  })

  it('[P23] the mark says so too', () => {
    const mark = (letGo: number) =>
      renderToStaticMarkup(createElement(WitnessMark, { state: 'whole', count: 0, letGo }))
    expect(mark(0)).toContain('aria-label="All sent"')
    expect(mark(2)).toContain('aria-label="Nothing waits, 2 let go"')
  })

  it('[P23] what is spoken when the count goes to nothing', () => {
    const was = { count: 1, letGo: 0 }
    expect(countNews(was, { count: 0, letGo: 0 })?.words).toBe(
      'Everything you recorded is at the shop.',
    )
    expect(countNews(was, { count: 0, letGo: 1 })).toEqual({
      words: 'Nothing waits any more.',
      buzz: false,
    })
    expect(countNews({ count: 1, letGo: 2 }, { count: 0, letGo: 2 })?.words).toBe(
      'The rest is at the shop.',
    )
    expect(countNews(was, { count: 2, letGo: 0 })?.words).toContain('2 not sent')
    expect(countNews({ count: 0, letGo: 0 }, { count: 0, letGo: 0 })).toBeNull()
  })

  it('[P16] what is stuck is not said to go by itself', () => {
    const held = view({ items: [item('stuck', 'a'), item('blocked', 'b')] })
    expect(standing(held, true)).toContain('None of it goes by itself')
    expect(standing(held, true)).not.toContain('With signal')
    const some = view({ items: [item('stuck', 'a'), item('waiting', 'b')] })
    expect(standing(some, true)).toContain('With signal it goes by itself')
    expect(standing(some, true)).toContain('What is stuck')
    expect(standing(view({ items: [item('waiting', 'b')] }), true)).not.toContain('stuck')
  })
})

describe('[P16] letting go asks for the file first', () => {
  it('[P16] names each file and never says that one was saved', () => {
    expect(handedWords(['a.json'], 1)).toBe(
      'Handed to the browser as a.json. Look among its downloads that it is there.',
    )
    expect(handedWords(['a.json', 'b.json'], 2)).toContain('a.json and b.json')
    expect(handedWords(['a.json'], 3)).toContain('2 more files to hand over')
    expect(
      letGoWords({ kind: 'photoBytes', code: 'wrongPicture' }, 'Photo', ['a.json', 'b.json']),
    ).toEqual({
      label: 'I have the files: let go',
      question: 'Are a.json and b.json on this phone? “Photo” is then never sent.',
      after: 'Let go, it is deleted here and is in the file alone.',
    })
    const told = (kind: UnsentItem['kind'], code: string) =>
      letGoWords({ kind, code }, 'One', ['a.json']).after
    expect(told('log.add', 'invalid')).toContain('stays on this phone')
    expect(told('photoBytes', 'bytesGone')).toContain('no longer holds it')
  })

  it('[P16] a file that cannot be made stops it', async () => {
    const exportFiles = () => Promise.reject(new Error('no room'))
    await expect(makeFiles({ exportFiles }, '2026-11-24T18:00:00.000Z')).rejects.toThrow()
  })

  it('[P16] each of several files has its name, and all must have gone to the browser', async () => {
    const exportFiles = async () => [new Blob(['a']), new Blob(['b'])]
    const files = await makeFiles({ exportFiles }, '2026-11-24T18:05:00.000Z')
    const names = files.map(({ name }) => name)
    expect(names).toEqual([
      'farbench-unsent-2026-11-24-18-05-1.json',
      'farbench-unsent-2026-11-24-18-05-2.json',
    ])
    expect(isAllHanded({ files: null, handed: [] })).toBe(false)
    expect(isAllHanded({ files: [], handed: [] })).toBe(false)
    expect(isAllHanded({ files, handed: names.slice(0, 1) })).toBe(false)
    expect(isAllHanded({ files, handed: names })).toBe(true)
  })
})
