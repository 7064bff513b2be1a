'use client'
import { useCallback, useState } from 'react'
import type { Plan, PlannedAction } from '@/lib/diag/plan'
import type { Id } from '@/lib/model/id'
import { adviceOf } from '../engine/advice'
import type { PlanView } from '../engine/use-plan'
import { useRoute } from '../field/router'
import { useBook } from '../store/use-book'
import { useStamp } from '../store/use-stamp'
import { oneAtATime } from './one-at-a-time'
import { useMay } from './use-may'
import { useSave } from './use-save'

export type Act = Pick<PlannedAction, 'type' | 'id'>
/** `drafts`: what was half written for it and is done with once the advice is kept. */
export type ActOn = (action: Act, reason: string | null, drafts?: string[]) => void

/** Where each kind of step is done. */
function hrefOf(jobId: Id, action: Act): string {
  switch (action.type) {
    case 'check':
      return `/field/jobs/${jobId}/checks/${action.id}`
    case 'swap':
      return `/field/jobs/${jobId}/swap/${action.id}`
    case 'repair':
      return `/field/jobs/${jobId}/fix?fault=${encodeURIComponent(action.id)}`
    case 'stop':
      return `/field/jobs/${jobId}/wayout`
  }
}

/** With a fix in, the step that is left is its proof run. */
const proving = (plan: Plan | null | undefined, action: Act): boolean =>
  plan?.stage === 'prove' && action.type === 'repair' && action.id === plan.next.id

/**
 * Starts a step, and keeps the advice that was on the screen as followed or overridden (rule R23). When the
 * newest entry could not be worked in there is no advice to keep: what stands on the screen is older.
 */
export function useActOn(jobId: Id, view: PlanView): ActOn {
  const { go } = useRoute()
  const { version } = useBook()
  const { save } = useSave()
  const stamp = useStamp()
  const keeps = useMay('advice.keep')
  const [once] = useState(() => oneAtATime<void>(undefined))
  return useCallback(
    (action, reason, drafts = []) => {
      const { answer, input, asked } = view
      const leave = () =>
        go(proving(answer?.plan, action) ? `/field/jobs/${jobId}/proof` : hrefOf(jobId, action))
      if (!keeps || view.failed || answer?.plan == null || input === null || version === null) {
        leave()
        return
      }
      const fields = adviceOf({
        id: stamp.newId(),
        jobId,
        at: stamp.now(),
        bookVersion: version,
        case: input,
        means: asked,
        answer,
        plan: answer.plan,
        chose: action.id,
        reason,
      })
      once(() =>
        save([{ kind: 'advice.keep', fields }], { clearDrafts: drafts }).then(leave, leave),
      ).catch(leave)
    },
    [jobId, view, version, go, save, stamp, keeps, once],
  )
}
