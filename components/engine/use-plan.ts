'use client'
import { useMemo } from 'react'
import type { Means } from '@/lib/diag/plan'
import type { Id } from '@/lib/model/id'
import type { Action } from './outlook-key'
import { useCase } from './use-case'
import { type EngineView, useEngine } from './use-engine'
import { type MeansView, useMeans } from './use-means'
import type { CaseInput, Question } from './work'

export type PlanView = EngineView & {
  means: MeansView
  /** What the answer on the screen was asked with (rule R23): not the present state, while that is worked in. */
  input: CaseInput | null
  asked: Means | null
}

const NONE: readonly Action[] = []

/** Suspects, next best action, runner-up and what was left out, for one job. */
export function usePlan(jobId: Id): PlanView {
  const found = useCase(jobId)
  const means = useMeans(jobId)
  const question = useMemo<Question | null>(
    () =>
      found === null || means.means === null
        ? null
        : { case: found.input, means: means.means, outlookOf: NONE },
    [found, means.means],
  )
  const view = useEngine(`plan ${jobId}`, question)
  const { question: asked } = view
  return { ...view, means, input: asked?.case ?? null, asked: asked?.means ?? null }
}
