import { useQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import { engine } from '@/components/engine/engine-client'
import { specForEngine } from '@/components/engine/spec-kept'
import { keyOf } from '@/components/engine/use-engine'
import type { Answer, Question } from '@/components/engine/work'
import type { BookIndex } from '@/lib/diag/book-index'
import type { DeskJob } from '@/lib/model/desk'
import { useDeskBook } from '../use-desk-book'

/** What the engine is asked: the very input the phone gives it, from the same entries and spec sheet. */
export function questionOf(found: DeskJob): Question {
  return {
    case: {
      features: { ...found.model?.features, ...found.machine?.features },
      spec: specForEngine(found.model?.specSheet ?? null),
      job: { complaint: found.job.complaint },
      entries: found.entries,
      meter: null,
    },
    means: null,
    outlookOf: [],
  }
}

export type JobCase = {
  index: BookIndex | null
  /** A newer code book than this one, which an entry was written with. */
  newerSeen: number | null
  answer: Answer | null
  /** A newer answer is being worked out; the one shown is of fewer entries. */
  working: boolean
  failed: boolean
}

/** Suspects of a job, worked out here by the engine of the phone. The last answer stands meanwhile. */
export function useJobCase(found: DeskJob | undefined): JobCase {
  const book = useDeskBook(found !== undefined, found?.entries)
  const { index, newerSeen } = book
  const question = useMemo(() => (found ? questionOf(found) : null), [found])
  const reckoned = useQuery<Answer>({
    queryKey: [
      'reckoned',
      found?.job.id,
      index?.version,
      index?.withdrawn.join(),
      question ? keyOf(question) : null,
    ],
    queryFn: () => {
      if (!index || !question) throw new Error('asked before the book was there')
      return engine.ask(index, question)
    },
    enabled: index !== null && question !== null,
    staleTime: Number.POSITIVE_INFINITY,
    placeholderData: (before, query) => (query?.queryKey[1] === found?.job.id ? before : undefined),
  })
  return {
    index,
    newerSeen,
    answer: reckoned.data ?? null,
    working: reckoned.isPlaceholderData || reckoned.isPending,
    failed: reckoned.isError || book.isError,
  }
}
