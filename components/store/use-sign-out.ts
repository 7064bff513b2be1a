'use client'
import { useMemo } from 'react'
import { useStore } from './store-provider'

export type SigningOut = {
  /** Calls the shop once more; answers how much is still unsent (SO1). */
  tryToSend(): Promise<number>
  /** The session ends, the store stays locked on this phone with all unsent work (SO2). */
  signOut(): Promise<void>
  /** The session ends and the store goes, with exactly so much unsent; false when it is another count (SO3). */
  signOutAndDelete(unsent: number): Promise<boolean>
}

/** The ways to sign out. */
export function useSigningOut(): SigningOut {
  const store = useStore()
  return useMemo(
    () => ({
      tryToSend: () => store.tryToSend(),
      signOut: () => store.signOut(),
      signOutAndDelete: (unsent) => store.signOutAndDelete(unsent),
    }),
    [store],
  )
}
