import { useEffect, useRef, useState } from 'react'
import type { BoardJob } from '@/lib/model/desk'

/**
 * How many entries came in per job since this page opened it, or since the page was loaded. What is
 * picked counts as looked at.
 */
export function useFresh(
  rows: readonly BoardJob[] | undefined,
  picked: string | null,
): ReadonlyMap<string, number> {
  const seen = useRef<Map<string, number> | null>(null)
  const [fresh, setFresh] = useState<ReadonlyMap<string, number>>(new Map())
  useEffect(() => {
    if (!rows) return
    const first = seen.current === null
    const known = seen.current ?? new Map<string, number>()
    seen.current = known
    const next = new Map<string, number>()
    for (const { job, entries } of rows) {
      if (first || job.id === picked) known.set(job.id, entries)
      next.set(job.id, entries - (known.get(job.id) ?? 0))
    }
    setFresh(next)
  }, [rows, picked])
  return fresh
}
