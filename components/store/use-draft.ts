'use client'
import { useMemo } from 'react'
import { AppError } from '@/lib/model/result'
import type { DraftKept } from '@/lib/sync/client/drafts'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

const OPENING = still({ ready: false, value: undefined, kept: 'nothing' as const })

/**
 * Something half written, kept to the keystroke under `key` until it is cleared or recorded. What is
 * held must be plain JSON of one shape per key; change the key when the shape changes. `kept` says
 * whether the store holds what stands here now: show it with DraftSign where people write.
 */
export function useDraft<T>(
  key: string,
  initial: T,
): { value: T; set(next: T): void; clear(): Promise<void>; ready: boolean; kept: DraftKept } {
  const phone = usePhone()
  const draft = useMemo(() => phone?.drafts.of(key) ?? null, [phone, key])
  const held = useWatch(draft === null ? OPENING : draft.watch)
  return useMemo(
    () => ({
      value: held.value === undefined ? initial : (held.value as T),
      ready: held.ready,
      kept: held.kept,
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
