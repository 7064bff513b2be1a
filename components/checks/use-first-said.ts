'use client'
import { useEffect } from 'react'
import type { Suspect } from '@/lib/diag/belief'
import { of100 } from '../reading-strip/figures'
import { announce } from '../ui/announce'

/** Who was first on each job the last time it was said. */
const firstOf = new Map<string, string>()

/** Says who is first now when that changes, once, to people who do not see the rows move. */
export function useFirstSaid(jobId: string, suspects: readonly Suspect[]): void {
  const first = suspects[0]
  useEffect(() => {
    if (first === undefined) return
    const before = firstOf.get(jobId)
    firstOf.set(jobId, first.fault)
    if (before !== undefined && before !== first.fault)
      announce(`${first.name} is now first, ${of100(first.chance)} of 100.`)
  }, [jobId, first])
}
