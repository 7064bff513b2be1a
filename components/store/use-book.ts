'use client'
import type { BookView } from '@/lib/sync/client/views'
import { useStore } from './store-provider'
import { useWatch } from './use-watch'

/** The code book held on this phone, indexed for the engine. */
export const useBook = (): BookView => useWatch(useStore().book)
