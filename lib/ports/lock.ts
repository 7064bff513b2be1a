import { AppError } from '@/lib/model/result'
import type { Timer } from './clock'

/** Lets one holder of a name run at a time, over all tabs and the worker of an origin (P19). */
export type Lock = {
  /**
   * Runs `work` once the name is free. `stale` is asked now and again while waiting; when it says yes
   * the name is taken from a holder that no longer moves. Throws AppError `turnTaken` when that happened
   * to this holder; its work goes on all the same.
   */
  run(name: string, work: () => Promise<void>, stale: () => Promise<boolean>): Promise<void>
}

/** How often a waiting tab asks whether the holder still moves. */
const ASK_EVERY_MS = 5_000

/** A lock within this process, in order of asking: for tests, and for browsers without Web Locks. */
export function inProcessLock(): Lock {
  const tails = new Map<string, Promise<void>>()
  return {
    run(name, work) {
      const turn = (tails.get(name) ?? Promise.resolve()).then(work)
      tails.set(
        name,
        turn.catch(() => undefined),
      )
      return turn
    },
  }
}

/** The browser's Web Locks; without them each page has its own lock, and sending twice does no harm (P4). */
export function webLock(timer: Timer): Lock {
  const fallback = inProcessLock()
  return {
    run(name, work, stale) {
      const locks = globalThis.navigator?.locks as LockManager | undefined
      if (locks === undefined) return fallback.run(name, work, stale)
      return runWithWebLocks({ locks, timer, name, work, stale })
    },
  }
}

type Run = {
  locks: LockManager
  timer: Timer
  name: string
  work: () => Promise<void>
  stale: () => Promise<boolean>
}

async function runWithWebLocks(run: Run): Promise<void> {
  const waiting = new AbortController()
  let granted = false
  let callOff: () => void = () => undefined
  const ask = () => {
    callOff = run.timer.after(ASK_EVERY_MS, () => {
      if (!granted) run.stale().then((stale) => (stale ? waiting.abort() : ask()), ask)
    })
  }
  ask()
  const work = async () => {
    granted = true
    await run.work()
  }
  try {
    await run.locks.request(run.name, { signal: waiting.signal }, work)
  } catch (cause) {
    // Work that fails brings its own error; a turn that was taken is told by the lock.
    if (granted && isAbort(cause)) throw new AppError('turnTaken', { retry: true, cause })
    if (granted || !waiting.signal.aborted) throw cause
    await run.locks.request(run.name, { steal: true }, work)
  } finally {
    callOff()
  }
}

const isAbort = (cause: unknown): boolean =>
  cause instanceof DOMException && cause.name === 'AbortError'
