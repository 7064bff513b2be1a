import { type RefObject, useLayoutEffect, useRef } from 'react'

/**
 * Hands the focus from the title of a screen that goes away to that of the screen that takes its place: from
 * "Opening" to what was fetched, from "Working out" to what was worked out (WCAG 2.4.3). Without it the focus
 * falls to the page's body. Only a title that had the focus hands it on, so nothing is taken from anybody.
 */
let isHandedOn = false

/** To be called as a title goes away, before it is gone. */
export function titleLeaves(title: Element | null, focused: Element | null): void {
  if (title !== null && title === focused) isHandedOn = true
}

/** To be called as a title comes. */
export function titleComes(title: { focus(how: FocusOptions): void } | null): void {
  if (!isHandedOn) return
  isHandedOn = false
  title?.focus({ preventScroll: true })
}

/** The title that can be seen: while a screen is fetched, the one before it is still there, hidden. */
export const shownTitle = (titles: Iterable<HTMLElement>): HTMLElement | undefined =>
  [...titles].find((title) => title.getClientRects().length > 0)

/** For the title of a screen: takes the focus that the title before it had, and hands it on. */
export function useTitle(): RefObject<HTMLHeadingElement | null> {
  const heading = useRef<HTMLHeadingElement>(null)
  useLayoutEffect(() => {
    const { current } = heading
    titleComes(current)
    return () => titleLeaves(current, document.activeElement)
  }, [])
  return heading
}
