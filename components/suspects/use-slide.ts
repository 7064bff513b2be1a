'use client'
import { type RefObject, useLayoutEffect, useRef } from 'react'

const SLIDE_MS = 160

/** Rows of a list slide to their new places when their order changes; at once with reduced motion. */
export function useSlide<T extends HTMLElement>(order: string): RefObject<T | null> {
  const list = useRef<T | null>(null)
  const before = useRef(new Map<string, number>())
  const last = useRef(order)
  useLayoutEffect(() => {
    const rows = [...(list.current?.children ?? [])].filter(
      (row): row is HTMLElement => row instanceof HTMLElement,
    )
    const tops = new Map(rows.map((row) => [row.dataset.row ?? '', row.offsetTop]))
    if (last.current !== order && !matchMedia('(prefers-reduced-motion: reduce)').matches) {
      for (const row of rows) slide(row, before.current.get(row.dataset.row ?? ''))
    }
    last.current = order
    before.current = tops
  })
  return list
}

function slide(row: HTMLElement, from: number | undefined): void {
  if (from === undefined || from === row.offsetTop) return
  row.animate([{ transform: `translateY(${from - row.offsetTop}px)` }, { transform: 'none' }], {
    duration: SLIDE_MS,
    easing: 'cubic-bezier(.2,0,0,1)',
  })
}
