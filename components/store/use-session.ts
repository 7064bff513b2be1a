'use client'
import type { Session } from '@/lib/sync/client/views'
import { useStore } from './store-provider'
import { useWatch } from './use-watch'

/** Who is at work on this phone. */
export const useSession = (): Session => useWatch(useStore().session)

/** Signs the person out: the session ends, the store stays locked on this phone with all unsent work. */
export function useSignOut(): () => Promise<void> {
  const store = useStore()
  return () => store.signOut()
}
