import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import PageError from '@/app/error'
import { TakeDownKey } from '@/components/field/codes/take-down-key'
import { daylightWords } from '@/components/field/job/daylight-line'
import { nightsAt } from '@/components/field/nights'
import { ageWords } from '@/components/field/phone/unsent-item'
import { SignedOutWords } from '@/components/field/signed-out'
import { whenWords } from '@/components/field/when-words'
import { saidNext } from '@/components/ui/live-region'
import { shownTitle, titleComes, titleLeaves } from '@/components/ui/title-focus'
import { isDark, lightAt } from '@/lib/diag/light'
import type { UnsentItem } from '@/lib/sync/client/views'

const ZONE = 'Etc/GMT+6'
const ms = (iso: string) => Date.parse(iso)

describe('[F14] a time goes with its day', () => {
  it.each([
    ['2026-11-24T20:05:00.000Z', '2026-11-24T23:00:00.000Z', '14:05'],
    ['2026-11-21T20:05:00.000Z', '2026-11-24T23:00:00.000Z', '21 Nov 14:05'],
    // Six in the morning UTC is midnight there: the day is that of the zone.
    ['2026-11-24T05:59:00.000Z', '2026-11-24T06:00:00.000Z', '23 Nov 23:59'],
    ['2025-11-24T20:05:00.000Z', '2026-11-24T23:00:00.000Z', '24 Nov 2025 14:05'],
  ])('[F14] %s seen at %s', (at, now, words) => {
    expect(whenWords(at, ZONE, ms(now))).toBe(words)
  })

  it('[F14] while it is not known what day it is, the day is named', () => {
    expect(whenWords('2026-11-24T20:05:00.000Z', ZONE, null)).toBe('24 Nov 14:05')
  })

  it('[F14] unsent work says how old it is', () => {
    const item = { reason: null, waitsFor: null, since: '2026-11-21T20:05:00.000Z' } as UnsentItem
    const now = ms('2026-11-24T20:05:00.000Z')
    expect(ageWords(item, now)).toBe(', recorded 3 days ago')
    expect(ageWords({ ...item, reason: 'The shop refused it.' }, now)).toBe(' Recorded 3 days ago')
  })
})

describe('[R6] the daylight of a job', () => {
  const place = { latitude: 47.1, longitude: -93.2 }
  const line = (iso: string) => {
    const { before, time, after } = daylightWords(lightAt(place, ms(iso)), ZONE)
    return `${before}${time ?? ''}${after}`
  }
  it('[R6] before dawn it says that it is dark, and until when', () => {
    expect(line('2026-11-24T09:00:00Z')).toMatch(
      /^It is dark\. Light from 0[67]:\d\d \(civil dawn\), [34] h \d\d from now\.$/,
    )
  })
  it('[R6] in the afternoon it says from when it is dark', () => {
    expect(line('2026-11-24T20:00:00Z')).toMatch(
      /^Sunset 16:\d\d\. Dark from 17:0\d \(civil dusk\), 3 h 0\d from now\.$/,
    )
  })
  it('[R6] where the sun stays away it names no time', () => {
    const light = lightAt({ latitude: 84, longitude: 25 }, ms('2026-12-21T11:00:00Z'))
    expect(daylightWords(light, ZONE)).toEqual({
      before: 'The sun does not rise here today.',
      time: null,
      after: '',
    })
  })

  it('[R6] theme and daylight agree, from the equator to where there is neither dusk nor dawn', () => {
    for (const latitude of [0, 47, 60, 66, 70, 78, 84]) {
      for (let day = 0; day < 365; day += 9) {
        const now = ms('2026-01-01T03:00:00Z') + day * 86_400_000 + latitude * 600_000
        const night = nightsAt(latitude, 25, now).some(([from, to]) => now >= from && now < to)
        expect([latitude, day, night]).toEqual([
          latitude,
          day,
          isDark({ latitude, longitude: 25 }, now),
        ])
      }
    }
  })
})

describe('what stands on the screen is true', () => {
  const signedOut = (emptied: boolean, held: boolean) =>
    renderToStaticMarkup(createElement(SignedOutWords, { emptied, held }))

  it('[Q4] an emptied phone of one person does not say that work is still here', () => {
    expect(signedOut(true, false)).not.toContain('still here')
    expect(signedOut(true, false)).toContain('of the person who was signed in')
    expect(signedOut(true, true)).toContain('Somebody else’s work')
  })
  it('[SO2] a store that is held is told of, none is not', () => {
    expect(signedOut(false, true)).toContain('Work that was recorded on this phone')
    expect(signedOut(false, false)).not.toContain('still here')
  })

  it('[R11] on the screen of the codes the key opens the form, elsewhere it leads there', () => {
    const shown = (props: { onTakeDown?: () => void }) =>
      renderToStaticMarkup(createElement(TakeDownKey, { jobId: 'j1', words: 'Take', ...props }))
    expect(shown({})).toContain('href="/field/jobs/j1/codes?more"')
    expect(shown({ onTakeDown: () => undefined })).toMatch(/^<button/)
  })

  it('[P2] a part of the app that was not fetched is tried again by loading the page anew', () => {
    type Drawn = { props: { onClick?: () => void; children: (Drawn | null)[] } }
    const keyOf = (error: Error, reset: () => void) => {
      const page = PageError({ error, reset }) as unknown as Drawn
      const keys = page.props.children.find((one) => Array.isArray(one?.props.children))
      return keys?.props.children.find((one) => one?.props.onClick)?.props.onClick
    }
    const reset = () => undefined
    expect(keyOf(new Error('else'), reset)).toBe(reset)
    const missing = Object.assign(new Error('gone'), { name: 'ChunkLoadError' })
    expect(keyOf(missing, reset)).not.toBe(reset)
  })
})

describe('[design 9] what is spoken and where the focus is', () => {
  it('[design 9] the same sentence twice is two messages', () => {
    const first = saidNext({ text: '', turn: 0 }, 'Saved on this phone.')
    const second = saidNext(first, 'Saved on this phone.')
    expect(second.text).toBe(first.text)
    expect(second.turn).not.toBe(first.turn)
  })

  it('[design 9] a title that had the focus hands it to the one that takes its place, once', () => {
    let taken = 0
    const title = { focus: () => (taken += 1) } as unknown as HTMLElement
    titleComes(title)
    titleLeaves(title, title)
    titleComes(title)
    titleComes(title)
    expect(taken).toBe(1)
  })

  it('[design 9] a title without the focus hands on nothing', () => {
    let taken = 0
    const title = { focus: () => (taken += 1) } as unknown as HTMLElement
    titleLeaves(title, null)
    titleComes(title)
    expect(taken).toBe(0)
  })

  it('[design 9] the hidden title of the screen before is passed over', () => {
    const made = (rects: number) => ({ getClientRects: () => ({ length: rects }) }) as HTMLElement
    const shown = made(1)
    expect(shownTitle([made(0), shown])).toBe(shown)
    expect(shownTitle([made(0)])).toBeUndefined()
  })
})
