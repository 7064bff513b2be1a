'use client'
import { useStore } from './store-provider'
import { useWatch } from './use-watch'

/** Whether a newer version of the app waits, and the way to take it: the page loads again. */
export function useAppUpdate(): { waiting: boolean; apply(): void } {
  const store = useStore()
  const waiting = useWatch(store.worker.waiting)
  return { waiting, apply: store.worker.apply }
}
