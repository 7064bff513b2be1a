import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { SILENCE_MS, startLive } from '@/components/desk/live/live-stream'
import type { LineState } from '@/components/desk/live/live-words'
import { fail, ok } from '@/lib/model/result'
import type { LineProblem, ShopLine, StreamHandlers } from '@/lib/ports/shop-line'
import type { Tabs } from '@/lib/ports/tabs'

/** Streams that the test opens, speaks on and breaks by hand. */
function fakeLine() {
  const streams: { on: StreamHandlers; open: boolean }[] = []
  let me: LineProblem | null = null
  const line: ShopLine = {
    getJson: () => Promise.resolve(me ? fail(me) : ok({})),
    openStream(_path, _names, on) {
      const stream = { on, open: true }
      streams.push(stream)
      return () => {
        stream.open = false
      }
    },
    signIn: () => Promise.resolve(fail({ kind: 'wrong' })),
    signOut: () => Promise.resolve(ok(null)),
  }
  const last = () => streams.at(-1)!.on
  return {
    line,
    streams,
    last,
    open: () => streams.filter((stream) => stream.open).length,
    meIs: (problem: LineProblem | null) => {
      me = problem
    },
    change: (seq: number, entity = 'logEntry') =>
      last().event('change', JSON.stringify({ seq, entity, id: `e${seq}`, jobId: 'j1' }), `${seq}`),
  }
}

/** Tabs of one browser: the first asker leads, the next one when it lets go. */
function fakeBrowser() {
  const queue: { run: () => void; led: boolean }[] = []
  const channels: { heard: (word: unknown) => void; open: boolean }[] = []
  const tabs: Tabs = {
    shared: true,
    lead(_name, run) {
      const mine = { run, led: false }
      queue.push(mine)
      const next = () => {
        if (queue[0] && !queue[0].led) {
          queue[0].led = true
          queue[0].run()
        }
      }
      next()
      return () => {
        queue.splice(queue.indexOf(mine), 1)
        next()
      }
    },
    channel(_name, heard) {
      const mine: (typeof channels)[number] = { heard, open: true }
      channels.push(mine)
      return {
        say(word) {
          if (!mine.open) throw new Error('channel is closed')
          const copy = structuredClone(word)
          for (const other of channels) if (other !== mine && other.open) other.heard(copy)
        },
        close() {
          mine.open = false
        },
      }
    },
  }
  return { tabs }
}

function tab(line: ShopLine, tabs: Tabs) {
  const states: LineState[] = []
  const changes: number[] = []
  let gaps = 0
  const stop = startLive({
    line,
    tabs,
    now: () => Date.now(),
    name: 'one',
    onState: (state) => states.push(state),
    onChange: ({ seq }) => changes.push(seq),
    onGap: () => {
      gaps += 1
    },
  })
  return { states, changes, stop, gaps: () => gaps, state: () => states.at(-1)?.kind }
}

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

describe('several tabs of one browser', () => {
  it('[R19] hold one stream between them and all hear every change', () => {
    const fake = fakeLine()
    const browser = fakeBrowser()
    const one = tab(fake.line, browser.tabs)
    fake.last().opened()
    const two = tab(fake.line, browser.tabs)
    expect(fake.streams).toHaveLength(1)
    expect(two.state()).toBe('live') // told at once on its hello
    fake.change(7)
    expect([one.changes, two.changes]).toEqual([[7], [7]])
    fake.last().broken(true)
    expect(two.state()).toBe('lost')
    one.stop()
    two.stop()
  })

  it('[R19] hand the stream on when the leading tab closes, and read anew what was missed between', () => {
    const fake = fakeLine()
    const browser = fakeBrowser()
    const one = tab(fake.line, browser.tabs)
    fake.last().opened()
    const two = tab(fake.line, browser.tabs)
    const before = two.gaps()
    one.stop()
    expect(fake.streams).toHaveLength(2)
    expect(fake.open()).toBe(1)
    fake.last().opened()
    expect(two.gaps()).toBe(before + 1)
    fake.change(8)
    expect(two.changes).toEqual([8])
    two.stop()
  })

  it('[R19] open a stream of their own while the leader is frozen, and give it up when it speaks again', async () => {
    const fake = fakeLine()
    const browser = fakeBrowser()
    const one = tab(fake.line, browser.tabs)
    fake.last().opened()
    const leader = fake.last()
    const two = tab(fake.line, browser.tabs)
    vi.advanceTimersByTime(SILENCE_MS + 5_000)
    // Both fell silent; the first tab is frozen, so only the second comes back.
    one.states.length = 0
    await vi.advanceTimersByTimeAsync(20_000)
    expect(fake.streams.length).toBeGreaterThan(1)
    fake.last().opened()
    expect(two.state()).toBe('live')
    leader.event('beat', '1', '1')
    expect(two.state()).toBe('live')
    one.stop()
    two.stop()
    expect(fake.open()).toBe(0)
  })
})
