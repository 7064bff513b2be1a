import { liveQuery, type Subscription } from 'dexie'
import { isDead, type Lifeline } from './lifeline'
import { LiveCell, type Source } from './watch'

/**
 * A watch over a query of the store: `read` runs again whenever another write, of any tab or the worker,
 * changes what it read; `open` unseals it outside of the query. Only the newest answer is shown.
 */
export function liveCell<R, T>(of: {
  initial: T
  read: () => Promise<R>
  open: (found: R) => Promise<T> | T
  failed: (cause: unknown) => void
  /** Of the store that is read: after it was opened anew the watch looks again (P25). */
  life?: Lifeline
  /** Lets go of what `open` made; the watch then starts anew. */
  ended?: () => void
}): LiveCell<T> {
  const source: Source<T> = (emit) => {
    let newest = 0
    let over = false
    let revived = false
    const onError = (cause: unknown) => {
      const { life } = of
      if (life === undefined || !isDead(cause)) of.failed(cause)
      else if (revived) life.lost.set(true)
      else {
        revived = true
        life.reopen().catch(() => undefined)
      }
    }
    const look = (): Subscription =>
      liveQuery(of.read).subscribe({
        next: (found) => {
          revived = false
          newest += 1
          const mine = newest
          Promise.resolve(of.open(found)).then((value) => {
            if (!over && mine === newest) emit(value)
          }, of.failed)
        },
        error: onError,
      })
    let subscription = look()
    const leave = of.life?.reopened.subscribe(() => {
      subscription.unsubscribe()
      subscription = look()
    })
    return () => {
      over = true
      leave?.()
      subscription.unsubscribe()
      of.ended?.()
    }
  }
  return new LiveCell(of.initial, source, of.ended === undefined)
}
