'use client'
import { useEffect, useState } from 'react'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import { usePorts } from '../store/store-provider'
import { useDraft } from '../store/use-draft'

/** A proof run under way. The start instant is kept, so the clock runs on while the phone is dead. */
export type ProofDraft = {
  starts: number
  faults: number
  /** Set while the clock runs. */
  runningSince: Instant | null
  /** Time of earlier stretches. */
  ranMs: number
  /** Minutes typed by hand; they win over the clock. */
  typedMinutes: string
  hot: 'hot' | 'cold' | null
  words: string
}
const FIRST: ProofDraft = {
  starts: 0,
  faults: 0,
  runningSince: null,
  ranMs: 0,
  typedMinutes: '',
  hot: null,
  words: '',
}

export const proofDraftKey = (jobId: Id): string => `proof:${jobId}`
export const useProofDraft = (jobId: Id) => useDraft<ProofDraft>(proofDraftKey(jobId), FIRST)

/** Time run so far in ms; ticks each half second while the clock runs. */
export function useRanMs(draft: ProofDraft): number {
  const { clock } = usePorts()
  const [now, setNow] = useState(() => clock.now())
  const since = draft.runningSince
  useEffect(() => {
    if (since === null) return
    setNow(clock.now())
    const timer = setInterval(() => setNow(clock.now()), 500)
    return () => clearInterval(timer)
  }, [clock, since])
  return ranUntil(draft, now)
}

/** Time run until an instant, in ms; never negative, whatever the clock did. */
export const ranUntil = (
  draft: Pick<ProofDraft, 'runningSince' | 'ranMs'>,
  nowMs: number,
): number =>
  draft.ranMs +
  (draft.runningSince === null ? 0 : Math.max(0, nowMs - Date.parse(draft.runningSince)))

/** The longest run that is taken in one entry: a day (a choice). */
const MOST_MINUTES = 1440

/** Minutes to record: as typed when typed, else the clock's to a tenth. Null when what is typed is none. */
export function minutesOf(draft: Pick<ProofDraft, 'typedMinutes'>, ranMs: number): number | null {
  const text = draft.typedMinutes.trim()
  if (text === '') return Math.round(ranMs / 6000) / 10
  if (!/^\d+([.,]\d+)?$/.test(text)) return null
  const typed = Number(text.replace(',', '.'))
  return typed <= MOST_MINUTES ? typed : null
}
