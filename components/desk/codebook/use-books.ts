import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { announce } from '@/components/ui/announce'
import {
  type ChangedJob,
  changedJobsAnswer,
  type DeskBook,
  deskBook,
  type Finding,
  type Withdrawable,
  withdrawableAnswer,
} from '@/lib/model/book-desk'
import type { Result } from '@/lib/model/result'
import { useDesk } from '../desk-context'
import { reads } from '../live/stale-reads'
import { read } from '../read-json'
import { type BookProblem, bookSentence } from './book-actions'

/** The versions of the shop's code book, its draft, and what was withdrawn. */
export function useBooks() {
  const { ports } = useDesk()
  return useQuery<DeskBook>({
    queryKey: reads.books,
    queryFn: () => read(ports.line, '/api/desk/codebook', deskBook),
  })
}

/** The jobs whose verdict a withdrawal changes. */
export function useChangedJobsOf(id: string, wanted: boolean) {
  const { ports } = useDesk()
  return useQuery<{ jobs: ChangedJob[] }>({
    queryKey: [...reads.books, 'jobs', id],
    queryFn: () => read(ports.line, `/api/desk/codebook/withdrawals/${id}`, changedJobsAnswer),
    enabled: wanted,
  })
}

/** What of the newest version may be withdrawn. */
export function useWithdrawable() {
  const { ports } = useDesk()
  return useQuery<{ items: Withdrawable[] }>({
    queryKey: [...reads.books, 'withdrawable'],
    queryFn: () => read(ports.line, '/api/desk/codebook/withdrawals', withdrawableAnswer),
  })
}

type Acting = {
  busy: boolean
  refusal: string | null
  findings: Finding[]
  act<T>(run: () => Promise<Result<T, BookProblem>>, said: (value: T) => string): Promise<T | null>
}

/** Presses one key at a time, says how it went, and reads the versions again. */
export function useBookActing(): Acting {
  const client = useQueryClient()
  const [busy, setBusy] = useState(false)
  const [refusal, setRefusal] = useState<string | null>(null)
  const [findings, setFindings] = useState<Finding[]>([])
  async function act<T>(
    run: () => Promise<Result<T, BookProblem>>,
    said: (value: T) => string,
  ): Promise<T | null> {
    setBusy(true)
    const answer = await run().catch(() => ({ ok: false, problem: { kind: 'trouble' } }) as const)
    setBusy(false)
    const words = answer.ok ? null : bookSentence(answer.problem)
    setRefusal(words)
    setFindings(!answer.ok && answer.problem.kind === 'findings' ? answer.problem.findings : [])
    if (answer.ok) announce(said(answer.value))
    else announce(words ?? '', 'assertive')
    await client.invalidateQueries({ queryKey: reads.book })
    return answer.ok ? answer.value : null
  }
  return { busy, refusal, findings, act }
}
