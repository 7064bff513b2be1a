'use client'

import { useSyncExternalStore } from 'react'
import { envPublic } from '@/lib/env-public'

/** True once the service worker answers for this page: then the app opens without signal. */
export function useWorkerReady(): boolean {
  return useSyncExternalStore(
    subscribe,
    () => !envPublic.production || workers()?.controller != null,
    () => false,
  )
}

const workers = () =>
  'serviceWorker' in navigator
    ? (navigator.serviceWorker as ServiceWorkerContainer | undefined)
    : undefined

function subscribe(listener: () => void): () => void {
  workers()?.addEventListener('controllerchange', listener)
  return () => workers()?.removeEventListener('controllerchange', listener)
}
