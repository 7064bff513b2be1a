'use client'
import { useSyncExternalStore } from 'react'
import type { Watch } from '@/lib/sync/client/watch'

/** The present value of a watch; the component draws again when it changes. */
export function useWatch<T>(watch: Watch<T>): T {
  return useSyncExternalStore(watch.subscribe, watch.get, watch.get)
}

/** A watch that never changes, for the time before a store is open. */
export function still<T>(value: T): Watch<T> {
  return { get: () => value, subscribe: () => () => undefined }
}
