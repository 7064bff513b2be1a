import { usePathname } from 'next/navigation'
import { type RefObject, useEffect } from 'react'

/** Addresses of the desk. */
export const deskPaths = {
  board: '/desk',
  job: (jobId: string) => `/desk/jobs/${jobId}`,
  parts: '/desk/parts',
  handOver: '/desk/import',
  phones: '/desk/phones',
  book: '/desk/codebook',
}

/** The id of the job the address names, or null. */
export function usePickedJob(): string | null {
  return /^\/desk\/jobs\/([^/]+)$/.exec(usePathname())?.[1] ?? null
}

const PLAIN = (event: MouseEvent) =>
  event.button === 0 && !event.metaKey && !event.ctrlKey && !event.shiftKey && !event.altKey

/**
 * Makes the links to jobs inside an element switch without loading a page: the whole board is one
 * screen and only the address changes. Other clicks, and other links, go the ordinary way.
 */
export function useSoftJobLinks(within: RefObject<HTMLElement | null>) {
  useEffect(() => {
    const element = within.current
    if (!element) return
    function follow(event: MouseEvent) {
      const link = event.target instanceof Element ? event.target.closest('a') : null
      const path = link?.getAttribute('href') ?? ''
      const soft = path === deskPaths.board || path.startsWith('/desk/jobs/')
      if (!soft || !PLAIN(event) || event.defaultPrevented) return
      event.preventDefault()
      if (path !== window.location.pathname) window.history.pushState(null, '', path)
    }
    element.addEventListener('click', follow)
    return () => element.removeEventListener('click', follow)
  }, [within])
}
