'use client'
import { useMemo } from 'react'
import { AppError, type Result } from '@/lib/model/result'
import type { Phone } from '@/lib/sync/client/phone'
import { NOTHING_UNSENT } from '@/lib/sync/client/unsent'
import type { UnsentItem, UnsentView } from '@/lib/sync/client/views'
import { usePhone, useStore } from './store-provider'
import { still, useWatch } from './use-watch'

export type { UnsentItem, UnsentView } from '@/lib/sync/client/views'

const OPENING = still(NOTHING_UNSENT)

export type UnsentActs = {
  trySending(): Promise<void>
  exportFiles(): Promise<Blob[]>
  /** Does a refused step again from where things stand now. */
  redo(item: UnsentItem): Promise<Result<null, { words: string }>>
  /** Gives up sending a stuck thing; hand out the files first. */
  letGo(item: UnsentItem): Promise<void>
}

/** Unsent work, and what a person can do about it. */
export function useUnsent(): UnsentView & UnsentActs {
  const phone = usePhone()
  const view = useWatch(phone === null ? OPENING : phone.unsent)
  return useMemo(() => ({ ...view, ...actsOf(phone) }), [view, phone])
}

function actsOf(phone: Phone | null): UnsentActs {
  const open = () => {
    if (phone === null) throw new AppError('nobodyAtWork')
    return phone
  }
  return {
    trySending: async () => {
      await phone?.sender.sendNow('tap')
    },
    exportFiles: async () => await open().exportFiles(),
    redo: async (item) => await open().redo(item.opId ?? ''),
    letGo: async ({ opId, hash }) => {
      if (opId !== null) await open().letGo({ opId })
      else if (hash !== null) await open().letGo({ hash })
    },
  }
}

/** Whether the browser sends on its own with the app closed, where it can (P20). */
export const useSendsClosed = (): boolean => useWatch(useStore().worker.sendsClosed)

/** What is wrong with the store itself, if anything (P25). */
export const useStoreTrouble = () => useWatch(useStore().trouble)
