'use client'

import { createContext, type ReactNode, use, useEffect, useMemo, useSyncExternalStore } from 'react'
import { AppError } from '@/lib/model/result'

/**
 * The field's own router: one static document for every address under /field, moved along by
 * history.pushState. Plain anchors work: presses on them are taken over here.
 */
type Router = {
  /** Segments after `/field`, decoded. */
  path: string[]
  search: URLSearchParams
  /** `from`: goes only when that is still the address, e.g. after a save during which the person left. */
  go: (to: string, options?: { replace?: boolean; from?: string }) => void
  /** The address now, without its question mark. */
  here: string
  back: () => void
}

const RouterContext = createContext<Router | null>(null)
const MOVED = 'farbench:moved'

function subscribe(listener: () => void): () => void {
  window.addEventListener('popstate', listener)
  window.addEventListener(MOVED, listener)
  return () => {
    window.removeEventListener('popstate', listener)
    window.removeEventListener(MOVED, listener)
  }
}
const address = () => window.location.pathname + window.location.search
const serverAddress = () => '/field'

function go(to: string, options: { replace?: boolean; from?: string } = {}): void {
  if (options.from !== undefined && options.from !== window.location.pathname) {
    return
  }
  if (options.replace === true) {
    window.history.replaceState(null, '', to)
  } else {
    window.history.pushState(null, '', to)
  }
  window.scrollTo(0, 0)
  window.dispatchEvent(new Event(MOVED))
}
const back = () => window.history.back()

/** Follows the address and takes over presses on links inside the field. */
export function FieldRouter({ children }: { children: ReactNode }) {
  const now = useSyncExternalStore(subscribe, address, serverAddress)
  useEffect(() => {
    document.addEventListener('click', followLink)
    return () => document.removeEventListener('click', followLink)
  }, [])
  const router = useMemo<Router>(() => {
    const url = new URL(now, window.location.origin)
    const path = url.pathname
      .split('/')
      .filter((part) => part !== '')
      .slice(1)
    return { path: path.map(decoded), search: url.searchParams, go, back, here: url.pathname }
  }, [now])
  return <RouterContext value={router}>{children}</RouterContext>
}

function decoded(part: string): string {
  try {
    return decodeURIComponent(part)
  } catch {
    return part
  }
}

/** A plain press on a link under /field moves inside the document; every other press is the browser's. */
function followLink(event: MouseEvent): void {
  const plain =
    event.button === 0 && !(event.metaKey || event.ctrlKey || event.shiftKey || event.altKey)
  if (!plain || event.defaultPrevented || !(event.target instanceof Element)) {
    return
  }
  const link = event.target.closest('a')
  if (link === null || link.target !== '' || link.hasAttribute('download')) {
    return
  }
  const url = new URL(link.href, window.location.href)
  const inField = url.pathname === '/field' || url.pathname.startsWith('/field/')
  if (url.origin === window.location.origin && inField && url.hash === '') {
    event.preventDefault()
    go(url.pathname + url.search)
  }
}

/** Where we are and how to go elsewhere. */
export function useRoute(): Router {
  const router = use(RouterContext)
  if (router === null) {
    throw new AppError('noFieldRouter')
  }
  return router
}
