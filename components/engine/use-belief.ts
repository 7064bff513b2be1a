'use client'
import { useMemo } from 'react'
import type { Id } from '@/lib/model/id'
import type { Action } from './outlook-key'
import { useCase } from './use-case'
import { type EngineView, useEngine } from './use-engine'
import type { Question } from './work'

/** The suspects of a job, and where the outcomes of the given checks or swaps would put them. */
export function useBelief(jobId: Id, outlookOf: readonly Action[] = NONE): EngineView {
  const found = useCase(jobId)
  const question = useMemo<Question | null>(
    () => (found === null ? null : { case: found.input, means: null, outlookOf }),
    [found, outlookOf],
  )
  return useEngine(`belief ${jobId}`, question)
}

/** The suspects as they stood without one entry, for "before and after". */
export function useBeliefWithout(jobId: Id, entryId: Id | null): EngineView {
  const found = useCase(jobId)
  const question = useMemo<Question | null>(() => {
    if (found === null || entryId === null) return null
    const entries = found.input.entries.filter((entry) => entry.id !== entryId)
    return { case: { ...found.input, entries }, means: null, outlookOf: NONE }
  }, [found, entryId])
  return useEngine(`without ${jobId} ${entryId}`, question)
}

/** The suspects as they stood just after one entry; null asks nothing. */
export function useBeliefUpTo(jobId: Id, entryId: Id | null): EngineView {
  const found = useCase(jobId)
  const question = useMemo<Question | null>(() => {
    if (found === null || entryId === null) return null
    const end = found.input.entries.findIndex((entry) => entry.id === entryId)
    if (end < 0) return null
    const entries = found.input.entries.slice(0, end + 1)
    return { case: { ...found.input, entries }, means: null, outlookOf: NONE }
  }, [found, entryId])
  return useEngine(`up to ${jobId} ${entryId}`, question)
}

const NONE: readonly Action[] = []
