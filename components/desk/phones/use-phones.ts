import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { announce } from '@/components/ui/announce'
import { type DeskPhones, deskPhones } from '@/lib/model/phones'
import { AppError, type Result } from '@/lib/model/result'
import { useDesk } from '../desk-context'
import { reads } from '../live/stale-reads'
import { read } from '../read-json'
import type { PhoneProblem } from './phone-actions'
import { phoneSentence } from './phone-words'

/** Phones come by themselves and tell no change, so the list is read again now and then (a choice). */
const EVERY_MS = 20_000

/** The shop's phones with what lies in quarantine. */
export function usePhones() {
  const { ports } = useDesk()
  return useQuery<DeskPhones>({
    queryKey: reads.phones,
    queryFn: () => read(ports.line, '/api/desk/phones', deskPhones),
    refetchInterval: EVERY_MS,
  })
}

type Acting = {
  busy: boolean
  /** Why the last press was refused; null when it was done. */
  refusal: string | null
  act<T>(run: () => Promise<Result<T, PhoneProblem>>, said: (value: T) => string): Promise<T | null>
}

/** Presses one key at a time, says how it went, and reads the list again. */
export function usePhoneActing(): Acting {
  const client = useQueryClient()
  const [busy, setBusy] = useState(false)
  const [refusal, setRefusal] = useState<string | null>(null)
  async function act<T>(
    run: () => Promise<Result<T, PhoneProblem>>,
    said: (value: T) => string,
  ): Promise<T | null> {
    setBusy(true)
    const answer = await run().catch(
      (cause: unknown) => ({ ok: false, problem: troubleOf(cause) }) as const,
    )
    setBusy(false)
    const words = answer.ok ? null : phoneSentence(answer.problem)
    setRefusal(words)
    if (answer.ok) announce(said(answer.value))
    else announce(words ?? '', 'assertive')
    await client.invalidateQueries({ queryKey: reads.all })
    return answer.ok ? answer.value : null
  }
  return { busy, refusal, act }
}

const troubleOf = (cause: unknown) =>
  ({ kind: cause instanceof AppError && cause.kind === 'busy' ? 'busy' : 'trouble' }) as const
