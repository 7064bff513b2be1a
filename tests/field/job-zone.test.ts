import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { expect, it } from 'vitest'
import { happenedAbout } from '@/components/field/log/happened-about'
import { LogItem } from '@/components/field/log/log-item'
import type { LogEntry } from '@/lib/model/log-entry'

const entryAt = (happenedAt: string, zone: string): LogEntry => ({
  id: 'e1',
  jobId: 'j1',
  supersedes: null,
  happenedAt,
  writtenAt: happenedAt,
  zone,
  authorId: 'p1',
  deviceId: 'd1',
  engineVersion: '1',
  bookVersion: null,
  body: { kind: 'note', words: 'Belt smells' },
})

it('[R8] a time typed as 11:30 is shown as 11:30, whatever zone the phone is in', () => {
  const typed = happenedAbout('11:30', '2026-11-24T18:40:30.500Z', 'Etc/GMT+6')
  const page = renderToStaticMarkup(
    createElement(LogItem, {
      line: { entry: entryAt(typed ?? '', 'Europe/Berlin'), sent: true, order: 1 } as never,
      log: [],
      struck: new Map(),
      index: null,
      gapMs: null,
      day: null,
      zone: 'Etc/GMT+6',
    }),
  )
  expect(page).toContain('>11:30<')
})
