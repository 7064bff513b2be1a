'use client'

import { useMemo } from 'react'
import { useMay } from '@/components/checks/use-may'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { useBook, useJobsBook } from '@/components/store/use-book'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { bookChanges } from '@/lib/diag/book-changes'
import type { Job } from '@/lib/model/job'
import { bookChangeLines } from './book-change-words'

/**
 * Which code book the job is worked out with, and the way to a newer one: a job keeps the version it began with
 * until a person moves it, which is a line of its log.
 */
export function BookPart({ job }: { job: Job }) {
  const { version, index, of } = useBook()
  const newest = useJobsBook()?.newest ?? null
  const mayWrite = useMay('log.add')
  const lines = useMemo(() => {
    const after = newest === null ? null : of(newest)
    return index === null || after === null ? [] : bookChangeLines(bookChanges(index, after))
  }, [index, newest, of])
  if (version === null || newest === null || job.state === 'closed') return null
  return (
    <section className="grid gap-2">
      <RuleEdge end={`version ${version}`}>Code book</RuleEdge>
      <p>
        This job began with version {version} and keeps it. Version {newest} is on this phone.
      </p>
      {lines.length === 0 ? (
        <p>It changes nothing that this job is worked out with.</p>
      ) : (
        <ul className="grid gap-1 border-l-4 border-ink pl-3">
          {lines.map((line) => (
            <li key={line}>{line}</li>
          ))}
        </ul>
      )}
      {mayWrite ? <MoveKey job={job} newest={newest} /> : null}
    </section>
  )
}

function MoveKey({ job, newest }: { job: Job; newest: number }) {
  const { entry } = useStamp()
  const { save, saving, problem } = useSave()
  const move = async () => {
    const words = `Code book version ${newest} from here on.`
    const moved = entry(job.id, { kind: 'note', words }, { bookVersion: newest })
    if (await save([moved])) announce(words)
  }
  return (
    <>
      <NotSaved problem={problem} />
      <Key small disabled={saving} onClick={() => void move()}>
        Use the new code book
      </Key>
    </>
  )
}
