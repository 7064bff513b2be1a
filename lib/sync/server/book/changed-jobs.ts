import { asShop, type ShopTx } from '@/db/client'
import { publishedBook, publishedVersion } from '@/db/queries/code-book'
import { listWithdrawals } from '@/db/queries/code-book-withdrawal'
import { jobsNaming } from '@/db/queries/jobs-naming'
import { listWholeLog } from '@/db/queries/log-entries'
import { findMachine, listModels } from '@/db/queries/machines'
import { belief } from '@/lib/diag/belief'
import { bookForJob } from '@/lib/diag/book-for-job'
import { type BookIndex, indexBook } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import { verdictChange, withoutWithdrawn } from '@/lib/diag/withdrawn'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import type { ChangedJob } from '@/lib/model/book-desk'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'

/**
 * Every job whose verdict a withdrawal changes (R23): the likeliest suspect with it and without it, by the version
 * the job holds and with the other withdrawals in force. Undefined when there is no such withdrawal.
 */
export async function changedJobs(shopId: Id, id: Id): Promise<ChangedJob[] | undefined> {
  return await asShop(shopId, async (tx) => {
    const all = await listWithdrawals(tx)
    const one = all.find((other) => other.id === id)
    if (one === undefined) return undefined
    const newest = (await publishedVersion(tx))?.version ?? 0
    const books = new Map<number, BookIndex | null>()
    const changed: ChangedJob[] = []
    for (const job of await jobsNaming(tx, one)) {
      const found = await changeOf(tx, { job, one, all, newest, books })
      if (found !== null) changed.push(found)
    }
    return changed
  })
}

type Asked = {
  job: Job
  one: BookWithdrawal
  all: readonly BookWithdrawal[]
  newest: number
  books: Map<number, BookIndex | null>
}

async function changeOf(
  tx: ShopTx,
  { job, one, all, newest, books }: Asked,
): Promise<ChangedJob | null> {
  const entries = await listWholeLog(tx, job.id)
  const others = all.filter((other) => other.id !== one.id)
  const versions = Array.from({ length: newest }, (_, n) => n + 1)
  const versionOf = (taken: readonly BookWithdrawal[]) =>
    bookForJob(versions, entries, withdrawnVersions(taken)).version
  const read = async (version: number | null): Promise<BookIndex | null> => {
    if (version === null) return null
    const held = books.get(version)
    if (held !== undefined) return held
    const book = await publishedBook(tx, version)
    const index = book === undefined ? null : indexBook(book)
    books.set(version, index)
    return index
  }
  const [was, is] = [await read(versionOf(others)), await read(versionOf(all))]
  if (was === null || is === null) return null
  const machine = await findMachine(tx, job.machineId)
  const [model] = machine?.modelId ? await listModels(tx, [machine.modelId]) : []
  const beliefIn = (index: BookIndex) =>
    belief(
      buildCase({
        index,
        features: { ...model?.features, ...machine?.features },
        spec: model?.specSheet ?? null,
        job,
        entries,
      }),
    )
  const change = verdictChange(
    beliefIn(withoutWithdrawn(was, others)),
    beliefIn(withoutWithdrawn(is, all)),
  )
  if (change === null) return null
  const { id: jobId, number, state } = job
  return { jobId, number, state, words: job.complaint.words, ...change }
}
