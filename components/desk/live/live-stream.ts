import type { ShopLine } from '@/lib/ports/shop-line'
import type { Tabs } from '@/lib/ports/tabs'
import { keepStream } from './keep-stream'
import { type Change, type LineState, type LiveWord, readChange, readWord } from './live-words'
import { type Asked, sessionAgain } from './session-again'

/**
 * Keeps the desk told of changes. One tab of the browser leads (Web Locks), holds the only event stream
 * and passes on what it hears (BroadcastChannel). A tab that hears nothing for a minute opens a stream of
 * its own until the leader speaks again; where a browser has no locks, each tab has one. A tab that finds
 * the session gone leads no longer and says so to nobody: each finds out for itself, and comes back by itself.
 * Cost of the choice: a change reaches the other tabs one message later.
 */
export type LiveOptions = Asked & {
  line: ShopLine
  tabs: Tabs
  now(): number
  /** Name of the lock and channel: one per shop and person. */
  name: string
  onState(state: LineState): void
  onChange(change: Change): void
  /** Changes may have been missed: read everything again. */
  onGap(): void
}

/** The server speaks at least every 20 s; three silences in a row are a dead line. */
export const SILENCE_MS = 60_000
const WATCH_MS = 5_000

/** Starts to listen; the answer stops it. States and changes come through the options' callbacks. */
export function startLive(options: LiveOptions): () => void {
  const { line, tabs, now } = options
  let state: LineState = { kind: 'opening' }
  let heardAt: number | null = null
  let lastWordAt = now()

  const channel = tabs.channel(options.name, (said) => hear(readWord(said)))
  const say = (word: LiveWord) => {
    if (lead.isMine()) channel.say(word)
  }
  function show(next: LineState) {
    state = next
    say({ kind: 'state', state: next })
    options.onState(next)
  }
  const lead = leadOf(options, () => stream.open())
  const { gap, event } = passOn(options, say)

  const stream = keepStream(line, {
    heard() {
      heardAt = now()
      lastWordAt = heardAt
      show({ kind: 'live', heardAt })
    },
    fresh: gap,
    event,
    lost: () => show({ kind: 'lost', heardAt }),
    session: () => session.ask(),
    signedOut() {
      lead.giveUp()
      show({ kind: 'signedOut' })
    },
  })

  const session = sessionAgain(options, {
    isOut: () => state.kind === 'signedOut',
    back() {
      lastWordAt = now()
      show({ kind: 'opening' })
      options.onGap()
      lead.queueUp()
      channel.say({ kind: 'hello' })
    },
  })

  /** Follows the leading tab; an own stream opened in its silence is given up. */
  function follow(word: Exclude<LiveWord, { kind: 'hello' }>) {
    lastWordAt = now()
    stream.rest()
    if (word.kind === 'change') return options.onChange(word.change)
    if (word.kind === 'gap') return options.onGap()
    state = word.state
    if (state.kind === 'live') heardAt = state.heardAt
    options.onState(state)
  }
  function hear(word: LiveWord | null) {
    if (word?.kind === 'hello') say({ kind: 'state', state })
    else if (!word || lead.isMine()) return
    else if (state.kind === 'signedOut') session.askAgain()
    // Only an older build says this of the whole browser.
    else if (word.kind !== 'state' || word.state.kind !== 'signedOut') follow(word)
  }

  const watch = setInterval(() => {
    if (now() - lastWordAt < SILENCE_MS || state.kind === 'signedOut') return
    lastWordAt = now()
    show({ kind: 'lost', heardAt })
    stream.later()
  }, WATCH_MS)
  lead.queueUp()
  channel.say({ kind: 'hello' })

  return () => {
    clearInterval(watch)
    session.stop()
    stream.stop()
    lead.giveUp()
    channel.close()
  }
}

/** This tab's turn to lead: waited for from `queueUp` on, until it is given up. */
function leadOf({ tabs, name }: LiveOptions, begin: () => void) {
  let isMine = false
  let stop: () => void = () => undefined
  return {
    isMine: () => isMine,
    queueUp() {
      stop = tabs.lead(name, () => {
        isMine = true
        begin()
      })
    },
    giveUp() {
      isMine = false
      stop()
    },
  }
}

/** What the stream told, to this tab and to the others. */
function passOn(to: LiveOptions, say: (word: LiveWord) => void) {
  function gap() {
    say({ kind: 'gap' })
    to.onGap()
  }
  return {
    gap,
    event(name: string, data: string) {
      if (name === 'beat') return
      const change = name === 'change' ? readChange(data) : null
      if (!change) return gap() // "resync", or a word this build does not know
      say({ kind: 'change', change })
      to.onChange(change)
    },
  }
}
