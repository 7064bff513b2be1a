import { liveQuery } from 'dexie'
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
  /** Lets go of what `open` made; the watch then starts anew. */
  ended?: () => void
}): LiveCell<T> {
  const source: Source<T> = (emit) => {
    let newest = 0
    let over = false
    const subscription = liveQuery(of.read).subscribe({
      next: (found) => {
        newest += 1
        const mine = newest
        Promise.resolve(of.open(found)).then((value) => {
          if (!over && mine === newest) emit(value)
        }, of.failed)
      },
      error: of.failed,
    })
    return () => {
      over = true
      subscription.unsubscribe()
      of.ended?.()
    }
  }
  return new LiveCell(of.initial, source, of.ended === undefined)
}
