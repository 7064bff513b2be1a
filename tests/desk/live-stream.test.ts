import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { SILENCE_MS } from '@/components/desk/live/live-stream'
import { fakeBrowser, fakeLine, tab } from '../support/desk-tabs'

beforeEach(() => {
  vi.useFakeTimers({ now: 1_000_000 })
})
afterEach(() => {
  vi.useRealTimers()
})

describe('the live line', () => {
  it('[R19] says live once the stream is open, reads everything anew and passes changes on', () => {
    const fake = fakeLine()
    const one = tab(fake.line, fakeBrowser().tabs)
    expect(one.states).toEqual([])
    fake.last().opened()
    expect(one.state()).toBe('live')
    expect(one.gaps()).toBe(1)
    fake.change(5)
    fake.change(6)
    expect(one.changes).toEqual([5, 6])
    one.stop()
    expect(fake.open()).toBe(0)
  })

  it('[R19] says not live with the time last heard as soon as the line breaks', () => {
    const fake = fakeLine()
    const one = tab(fake.line, fakeBrowser().tabs)
    fake.last().opened()
    vi.advanceTimersByTime(10_000)
    fake.last().broken(true)
    expect(one.states.at(-1)).toEqual({ kind: 'lost', heardAt: 1_000_000 })
    fake.last().opened()
    expect(one.state()).toBe('live')
    // The browser came back with Last-Event-ID: nothing was missed, nothing is read anew.
    expect(one.gaps()).toBe(1)
    one.stop()
  })

  it('[R19] counts a minute of silence as a dead line, though the connection looks open', async () => {
    const fake = fakeLine()
    const one = tab(fake.line, fakeBrowser().tabs)
    fake.last().opened()
    for (let i = 0; i < 10; i++) {
      vi.advanceTimersByTime(15_000)
      fake.last().event('beat', '1', '1')
    }
    expect(one.state()).toBe('live')
    vi.advanceTimersByTime(SILENCE_MS + 5_000)
    expect(one.state()).toBe('lost')
    await vi.advanceTimersByTimeAsync(20_000)
    expect(fake.streams).toHaveLength(2)
    expect(fake.open()).toBe(1)
    one.stop()
  })

  it('[R22] stops asking when the session is gone, and comes back after a refusal that passes', async () => {
    const fake = fakeLine()
    const one = tab(fake.line, fakeBrowser().tabs)
    fake.last().opened()
    fake.meIs({ kind: 'serverTrouble' })
    fake.last().broken(false)
    await vi.advanceTimersByTimeAsync(1_500)
    expect(fake.streams).toHaveLength(1)
    fake.meIs(null)
    await vi.advanceTimersByTimeAsync(5_000)
    expect(fake.streams).toHaveLength(2)
    fake.last().opened()
    expect(one.gaps()).toBe(2)
    fake.meIs({ kind: 'signedOut' })
    fake.last().broken(false)
    await vi.advanceTimersByTimeAsync(5_000)
    expect(one.state()).toBe('signedOut')
    await vi.advanceTimersByTimeAsync(600_000)
    expect(fake.streams).toHaveLength(2)
    one.stop()
  })

  it('[R19] reads everything anew after a resync and after a word it does not know', () => {
    const fake = fakeLine()
    const one = tab(fake.line, fakeBrowser().tabs)
    fake.last().opened()
    fake.last().event('resync', '9', '9')
    fake.last().event('change', 'not json', '10')
    expect(one.gaps()).toBe(3)
    expect(one.changes).toEqual([])
    one.stop()
  })
})
