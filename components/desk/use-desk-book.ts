import { useQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import { bookForJob } from '@/lib/diag/book-for-job'
import { type BookIndex, indexBook } from '@/lib/diag/book-index'
import { withoutWithdrawn } from '@/lib/diag/withdrawn'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import { servedBook } from '@/lib/model/book-desk'
import type { CodeBook } from '@/lib/model/code-book'
import type { LogEntry } from '@/lib/model/log-entry'
import { type BookNotices, bookNotices } from '@/lib/sync/protocol/book'
import { useDesk } from './desk-context'
import { reads } from './live/stale-reads'
import { read } from './read-json'

const NONE: readonly LogEntry[] = []

export type DeskBookRead = {
  index: BookIndex | null
  /** A newer version than this one, which an entry was written with and the shop does not have. */
  newerSeen: number | null
  isError: boolean
}

/**
 * The version of the code book that a job holds, by the rule of the phone (lib/diag/book-for-job.ts), without what
 * was withdrawn from it; without entries the newest. The shop has every version.
 */
export function useDeskBook(wanted: boolean, entries: readonly LogEntry[] = NONE): DeskBookRead {
  const { ports } = useDesk()
  const notices = useQuery<BookNotices>({
    queryKey: [...reads.book, 'notices'],
    queryFn: () => read(ports.line, '/api/codebook?as=notices', bookNotices),
    enabled: wanted,
    staleTime: 60_000,
    gcTime: Number.POSITIVE_INFINITY,
  })
  const taken = notices.data?.withdrawals
  const newest = notices.data?.newest ?? 0
  const { version, newerSeen } = useMemo(() => {
    const versions = Array.from({ length: newest }, (_, n) => n + 1)
    return bookForJob(versions, entries, withdrawnVersions(taken ?? []))
  }, [newest, entries, taken])
  const book = useQuery<CodeBook>({
    queryKey: [...reads.book, version],
    queryFn: () => read(ports.line, `/api/codebook?version=${version}`, servedBook),
    enabled: wanted && version !== null,
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: Number.POSITIVE_INFINITY,
  })
  const index = useMemo(
    () => (book.data && taken ? withoutWithdrawn(indexBook(book.data), taken) : null),
    [book.data, taken],
  )
  return { index, newerSeen, isError: notices.isError || book.isError }
}
