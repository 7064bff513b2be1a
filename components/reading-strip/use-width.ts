'use client'
import { type RefObject, useEffect, useRef, useState } from 'react'

/** The drawn width of an element in CSS pixels, so that figures in a drawing keep their size. */
export function useWidth<T extends Element>(first: number): [RefObject<T | null>, number] {
  const ref = useRef<T | null>(null)
  const [width, setWidth] = useState(first)
  useEffect(() => {
    const element = ref.current
    if (element === null) return
    const measure = () => setWidth(Math.max(200, Math.round(element.getBoundingClientRect().width)))
    measure()
    const observer = new ResizeObserver(measure)
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  return [ref, width]
}
