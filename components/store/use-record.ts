'use client'
import { useCallback } from 'react'
import { AppError } from '@/lib/model/result'
import type { NewPhoto } from '@/lib/sync/client/views'
import type { OpInput } from '@/lib/sync/protocol/op'
import { usePhone } from './store-provider'

export type { NewPhoto } from '@/lib/sync/client/views'

/** Keeps what a person did: rows, outbox, photos and cleared drafts in one transaction (P1). */
export function useRecord(): (
  ops: OpInput[],
  more?: { photos?: NewPhoto[]; clearDrafts?: string[] },
) => Promise<void> {
  const phone = usePhone()
  return useCallback(
    (ops, more) => {
      if (phone === null) throw new AppError('nobodyAtWork')
      return phone.record(ops, more)
    },
    [phone],
  )
}
