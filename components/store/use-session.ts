'use client'
import type { Session } from '@/lib/sync/client/views'
import { useStore } from './store-provider'
import { useWatch } from './use-watch'

/** Who is at work on this phone. */
export const useSession = (): Session => useWatch(useStore().session)
