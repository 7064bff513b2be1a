import { useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { announce } from '@/components/ui/announce'
import type { Result } from '@/lib/model/result'
import { type ActedProblem, actedSentence } from './desk-sentences'
import { reads } from './live/stale-reads'

type Acting = {
  busy: boolean
  /** Why the last press was refused; null when it was done. */
  refusal: string | null
  act(run: () => Promise<Result<null, ActedProblem>>, done: string): Promise<boolean>
}

/**
 * Presses one desk action at a time and says how it went. What it changed is read again at once,
 * without waiting for the event.
 */
export function useActing(): Acting {
  const client = useQueryClient()
  const [busy, setBusy] = useState(false)
  const [refusal, setRefusal] = useState<string | null>(null)
  async function act(run: () => Promise<Result<null, ActedProblem>>, done: string) {
    setBusy(true)
    const answer = await run().catch(() => ({ ok: false, problem: { kind: 'trouble' } }) as const)
    setBusy(false)
    setRefusal(answer.ok ? null : actedSentence(answer.problem))
    if (answer.ok) announce(done)
    else announce(actedSentence(answer.problem), 'assertive')
    await client.invalidateQueries({ queryKey: reads.all })
    return answer.ok
  }
  return { busy, refusal, act }
}
