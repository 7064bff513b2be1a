/**
 * Tabs of one browser: who leads, and a word to the others. A browser allows six HTTP/1.1 connections
 * to one host, so the desk keeps one event stream per browser and shares what it hears.
 */
export type Tabs = {
  /** True when tabs can choose a leader and talk; else every tab stands alone. */
  readonly shared: boolean
  /** Runs `lead` once this tab is the leader, at the latest when the leader before it is gone. */
  lead(name: string, lead: () => void): () => void
  /** A channel to the other tabs; `heard` gets what they say, never this tab's own words. */
  channel(name: string, heard: (word: unknown) => void): { say(word: unknown): void; close(): void }
}

function lead(name: string, run: () => void): () => void {
  const wait = new AbortController()
  let release: () => void = () => undefined
  const held = new Promise<void>((resolve) => {
    release = resolve
  })
  navigator.locks
    .request(name, { signal: wait.signal }, async () => {
      // The lock may have been given just before it was given up.
      if (wait.signal.aborted) return
      run()
      await held
    })
    .catch(() => undefined) // given up while waiting: another tab leads
  return () => {
    release()
    wait.abort()
  }
}

function channel(name: string, heard: (word: unknown) => void) {
  const line = new BroadcastChannel(name)
  line.onmessage = (event: MessageEvent<unknown>) => heard(event.data)
  return { say: (word: unknown) => line.postMessage(word), close: () => line.close() }
}

const alone: Tabs = {
  shared: false,
  lead: (_, run) => {
    run()
    return () => undefined
  },
  channel: () => ({ say: () => undefined, close: () => undefined }),
}

/** The tabs of this browser: Web Locks choose the leader, a BroadcastChannel carries the words. */
export function browserTabs(): Tabs {
  const able = typeof BroadcastChannel !== 'undefined' && 'locks' in navigator
  return able ? { shared: true, lead, channel } : alone
}
