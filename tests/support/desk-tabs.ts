// Desks open in tabs of one browser, on a line that the test opens, speaks on and breaks by hand.
import { startLive } from '@/components/desk/live/live-stream'
import type { LineState } from '@/components/desk/live/live-words'
import { fail, ok } from '@/lib/model/result'
import type { LineProblem, ShopLine, StreamHandlers } from '@/lib/ports/shop-line'
import type { Tabs } from '@/lib/ports/tabs'

/** Streams that the test opens, speaks on and breaks by hand. */
export function fakeLine() {
  const streams: { on: StreamHandlers; open: boolean }[] = []
  let me: LineProblem | null = null
  let who = 'me'
  const line: ShopLine = {
    getJson: () => Promise.resolve(me ? fail(me) : ok({ who })),
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
    whoIs: (name: string) => {
      who = name
    },
    change: (seq: number, entity = 'logEntry') =>
      last().event('change', JSON.stringify({ seq, entity, id: `e${seq}`, jobId: 'j1' }), `${seq}`),
  }
}

/** Tabs of one browser: the first asker leads, the next one when it lets go. */
export function fakeBrowser() {
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

/** One desk that is open in a tab, with what it was told. */
export function tab(line: ShopLine, tabs: Tabs) {
  const states: LineState[] = []
  const changes: number[] = []
  let gaps = 0
  let look: () => void = () => undefined
  const stop = startLive({
    line,
    tabs,
    now: () => Date.now(),
    name: 'one',
    isMe: (answer) => (answer as { who?: string }).who !== 'another',
    onLook: (run) => {
      look = run
      return () => undefined
    },
    onState: (state) => states.push(state),
    onChange: ({ seq }) => changes.push(seq),
    onGap: () => {
      gaps += 1
    },
  })
  return {
    states,
    changes,
    stop,
    look: () => look(),
    gaps: () => gaps,
    state: () => states.at(-1)?.kind,
  }
}
