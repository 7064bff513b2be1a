'use client'
import { useMemo } from 'react'
import { AppError } from '@/lib/model/result'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

const OPENING = still({ ready: false, value: undefined })

/**
 * Something half written, kept to the keystroke under `key` until it is cleared or recorded. What is
 * held must be plain JSON of one shape per key; change the key when the shape changes.
 */
export function useDraft<T>(
  key: string,
  initial: T,
): { value: T; set(next: T): void; clear(): Promise<void>; ready: boolean } {
  const phone = usePhone()
  const draft = useMemo(() => phone?.drafts.of(key) ?? null, [phone, key])
  const held = useWatch(draft === null ? OPENING : draft.watch)
  return useMemo(
    () => ({
      value: held.value === undefined ? initial : (held.value as T),
      ready: held.ready,
      set: (next: T) => {
        if (draft === null) throw new AppError('nobodyAtWork')
        draft.set(next)
      },
      clear: async () => {
        await draft?.clear()
      },
    }),
    [held, draft, initial],
  )
}
