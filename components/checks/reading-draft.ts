'use client'
import { useMemo } from 'react'
import { meterInput } from '@/lib/diag/meter'
import { judge, type ReadingInput, type ReadingResult } from '@/lib/diag/reading'
import type { Judged } from '@/lib/diag/spec-of'
import { inKeptUnit, type TypedUnit, unitOf } from '@/lib/diag/typed-units'
import type { Id } from '@/lib/model/id'
import type { ReadingBody } from '@/lib/model/log-entry'
import type { Quantity } from '@/lib/model/meter-profile'
import { unitLabel } from '../reading-strip/unit-words'
import type { StripReading } from '../reading-strip/verdict'
import { useDraft } from '../store/use-draft'
import { figureOf } from './keypad-text'
import type { MeterView } from './meter-setup'

/** A reading half typed, kept to the keystroke (rule R8). */
export type ReadingDraft = {
  typed: string
  unit: string | null
  overRange: boolean
  subject: 'suspect' | 'knownGood'
}
const FIRST: ReadingDraft = { typed: '', unit: null, overRange: false, subject: 'suspect' }

export const readingDraftKey = (jobId: Id, checkId: string): string => `reading:${jobId}:${checkId}`

export const useReadingDraft = (jobId: Id, checkId: string) =>
  useDraft<ReadingDraft>(readingDraftKey(jobId, checkId), FIRST)

export type Live = {
  unit: TypedUnit
  /** The unit as it stands on the screen. */
  label: string
  input: ReadingInput | null
  result: ReadingResult | null
  strip: StripReading | null
}

/** The verdict on what stands on the keypad now; nothing while there is no figure or no meter for it. */
export function useLive(
  draft: ReadingDraft,
  view: MeterView,
  of: { quantity: Quantity; judged: Judged },
): Live {
  const { quantity, judged } = of
  return useMemo(() => {
    const unit = unitOf(quantity, draft.unit)
    const label = unitLabel(quantity, unit.id)
    const typed = figureOf(draft.typed)
    const base = meterInput(view.meter, view.setup, { quantity, spec: judged.value })
    if (base === null || typed === null)
      return { unit, label, input: null, result: null, strip: null }
    const input: ReadingInput = {
      ...base,
      value: inKeptUnit(typed, unit),
      overRange: draft.overRange,
    }
    const result = judge(input)
    const strip: StripReading = {
      shown: draft.typed,
      unit: label,
      overRange: draft.overRange,
      quantity,
      estimate: result.estimate,
      expandedU: result.expandedU,
      limits: result.limits,
      verdict: result.verdict,
      resolution: input.meterFunction.resolution,
    }
    return { unit, label, input, result, strip }
  }, [draft, view.meter, view.setup, quantity, judged])
}

/** The reading as one line of the job log, with everything its budget needs (rule R23). */
export function readingBodyOf(of: {
  checkId: string
  draft: ReadingDraft
  view: MeterView
  live: Live
}): ReadingBody | null {
  const { live, view, draft } = of
  const { input, result } = live
  if (input === null || result === null || view.meter === null) return null
  const { verdict, estimate, standardU, expandedU, conformance, conformanceExact } = result
  return {
    kind: 'reading',
    checkId: of.checkId,
    quantity: input.quantity,
    value: input.value,
    unit: live.unit.id,
    asTyped: draft.typed,
    overRange: draft.overRange,
    subject: draft.subject,
    meterId: view.meter.id,
    meterName: view.meter.name,
    meterFunction: input.meterFunction,
    leadsOhm: input.leadsOhm,
    nulled: input.nulled,
    partTempC: input.partTempC,
    meterTempC: input.meterTempC,
    perKelvin: input.perKelvin,
    spec: input.spec,
    result:
      verdict === null
        ? null
        : { verdict, estimate, standardU, expandedU, conformance, conformanceExact },
  }
}
