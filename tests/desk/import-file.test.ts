// What the desk says of a phone's file when the shop's answer is missing or cannot be read.
import { describe, expect, it } from 'vitest'
import { askAbout } from '@/components/desk/import/ask-about'
import { fail, ok, type Result } from '@/lib/model/result'
import type { FileLine, FileRefusal } from '@/lib/ports/file-line'
import type { ImportAnswer } from '@/lib/sync/protocol/unsent-file'

const found: ImportAnswer = {
  applied: false,
  madeAt: '2026-11-24T18:40:00.000Z',
  person: { id: '01980000-0000-7000-8000-0000000000a1', name: 'Test person' },
  device: { id: '01980000-0000-7000-8000-0000000000a2', name: 'Test phone' },
  quarantine: null,
  ops: [],
  photos: [],
}
const FILE = new Blob(['{}'])

function answering(answer: Result<unknown, FileRefusal>) {
  const asked: string[] = []
  const line: FileLine = {
    post(path) {
      asked.push(path)
      return Promise.resolve(answer)
    },
  }
  return { line, asked }
}
const none = (kind: string, title: string | null = null) => fail({ kind, title })

describe('the file of a phone at the desk', () => {
  it('[IM1] is looked at, then taken, and shows what the shop answered', async () => {
    const { line, asked } = answering(ok(found))
    const looked = await askAbout(line, FILE, { take: false, list: null })
    expect(looked).toEqual({ list: found, refusal: null })
    const taken = answering(ok({ ...found, applied: true }))
    expect(await askAbout(taken.line, FILE, { take: true, list: found })).toMatchObject({
      list: { applied: true },
      refusal: null,
    })
    expect([...asked, ...taken.asked]).toEqual(['/api/desk/import', '/api/desk/import?do=take'])
  })

  it.each([
    ['the connection went', none('noConnection')],
    ['the server broke off', none('serverTrouble')],
    ['the answer cannot be read', ok({ applied: true })],
  ])('[IM2] when %s after the take: not sure, and the list stays', async (_, answer) => {
    const shown = await askAbout(answering(answer).line, FILE, { take: true, list: found })
    expect(shown.list).toBe(found)
    expect(shown.refusal).toContain('not sure whether it was taken')
    expect(shown.refusal).toContain('Look again')
    expect(shown.refusal).not.toContain('Nothing was taken')
  })

  it('[IM2] says of a look only that there was no answer, and keeps what was found before', async () => {
    const { line } = answering(none('noConnection'))
    const first = await askAbout(line, FILE, { take: false, list: null })
    expect(first).toEqual({
      list: null,
      refusal: 'No answer from the shop. Look again in a moment.',
    })
    expect((await askAbout(line, FILE, { take: false, list: found })).list).toBe(found)
  })

  it('[IM3] gives the shop’s own sentence for a refusal', async () => {
    const title = 'The file is of another shop. Nothing was taken.'
    const { line } = answering(none('otherShop', title))
    expect(await askAbout(line, FILE, { take: true, list: null })).toEqual({
      list: null,
      refusal: title,
    })
  })
})
