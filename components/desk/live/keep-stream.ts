import type { ShopLine } from '@/lib/ports/shop-line'
import { backoffMs } from './live-words'
import type { Session } from './session-again'

/** What a kept stream tells its owner. */
export type KeptStreamOwner = {
  /** Anything at all came over the line. */
  heard(): void
  /** A stream began from now: what came before is not in it. A browser's own return is not told here. */
  fresh(): void
  event(name: string, data: string): void
  lost(): void
  /** Whether the session is still this person's; `unknown` when the shop cannot be asked. */
  session(): Promise<Session>
  signedOut(): void
}

export const STREAM_PATH = '/api/events'
const NAMES = ['change', 'resync', 'beat'] as const

/**
 * One event stream that comes back: by the browser itself with Last-Event-ID where it can, else anew
 * after a growing pause, unless the session is gone.
 */
export function keepStream(line: Pick<ShopLine, 'openStream'>, owner: KeptStreamOwner) {
  let close: (() => void) | null = null
  let timer: ReturnType<typeof setTimeout> | undefined
  let tries = 0
  let stopped = false

  function rest() {
    close?.()
    close = null
    clearTimeout(timer)
    timer = undefined
  }

  function open() {
    if (stopped) return
    rest()
    let again = false
    close = line.openStream(STREAM_PATH, NAMES, {
      opened() {
        tries = 0
        owner.heard()
        if (!again) owner.fresh()
        again = true
      },
      event(name, data) {
        owner.heard()
        owner.event(name, data)
      },
      broken(retrying) {
        owner.lost()
        if (!retrying) later()
      },
    })
  }

  function later() {
    rest()
    timer = setTimeout(() => void reopen(), backoffMs(tries++))
  }

  async function reopen() {
    const session = await owner.session()
    if (stopped) return
    if (session === 'gone') owner.signedOut()
    else if (session === 'mine') open()
    else later()
  }

  return {
    open,
    /** Tries again after a pause. */
    later,
    /** Gives the stream up until `open` or `later`. */
    rest,
    stop() {
      stopped = true
      rest()
    },
  }
}
