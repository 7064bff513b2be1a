import { useSyncExternalStore } from 'react'
import { useDesk } from './desk-context'

const MINUTE_MS = 60_000

/** The present minute in ms since 1970, renewed each minute; null while the server renders. */
export function useNow(): number | null {
  const { ports } = useDesk()
  return useSyncExternalStore(
    (changed) => {
      const timer = setInterval(changed, 5_000)
      return () => clearInterval(timer)
    },
    () => Math.floor(ports.now() / MINUTE_MS) * MINUTE_MS,
    () => null,
  )
}
