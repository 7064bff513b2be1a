'use client'

import { useCallback, useLayoutEffect, useRef } from 'react'

/**
 * Changes some fields of a draft, always on top of its newest value: an answer that comes late (a
 * position, a photo) must not take back what was typed while it was on its way.
 */
export function usePatch<T extends object>(
  value: T,
  set: (next: T) => void,
): (next: Partial<T>) => void {
  const newest = useRef(value)
  const write = useRef(set)
  useLayoutEffect(() => {
    newest.current = value
    write.current = set
  }, [value, set])
  return useCallback((next: Partial<T>) => {
    newest.current = { ...newest.current, ...next }
    write.current(newest.current)
  }, [])
}
