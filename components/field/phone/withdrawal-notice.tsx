'use client'

import { NotSaved, useSave } from '@/components/checks/use-save'
import { useStamp } from '@/components/store/use-stamp'
import { useUnheard } from '@/components/store/use-withdrawals'
import { announce } from '@/components/ui/announce'
import { Caution } from '@/components/ui/caution'
import { Key } from '@/components/ui/key'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import { jobHref } from '../route'
import { clockTime, dayOf } from '../times'
import { useChangedJobs } from './use-changed-jobs'
import { changeWords, withdrawnHead } from './withdrawal-words'

/** Safety withdrawals from the code book, one after the other, until each is acknowledged (R23). */
export function WithdrawalNotice() {
  const [one] = useUnheard()
  return one === undefined ? null : <Notice key={one.id} one={one} />
}

function Notice({ one }: { one: BookWithdrawal }) {
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const acknowledge = async () => {
    const fields = { withdrawalId: one.id, at: stamp.now() }
    if (await save([{ kind: 'book.heard', fields }])) announce('Acknowledged. The shop is told.')
  }
  return (
    <section
      role="alert"
      aria-label="Withdrawn from the code book"
      className="safe-sides grid gap-2 border-y-2 border-nogo py-3"
    >
      <Caution signal="WARNING">
        {withdrawnHead(one)} {one.reason}
      </Caution>
      {one.instead === null ? null : <p className="font-bold">Instead: {one.instead}</p>}
      <p className="text-second text-ink2">
        Withdrawn by the shop on {dayOf(one.at, stamp.zone)} at {clockTime(one.at, stamp.zone)}.
      </p>
      <ChangedJobs one={one} />
      <NotSaved problem={problem} />
      <div>
        <Key small onClick={() => void acknowledge()} disabled={saving}>
          I have read it
        </Key>
      </div>
    </section>
  )
}

function ChangedJobs({ one }: { one: BookWithdrawal }) {
  const changed = useChangedJobs(one)
  if (changed.length === 0) return <p>No job on this phone is worked out otherwise by it.</p>
  return (
    <div className="grid gap-1">
      <p className="font-bold">Jobs on this phone whose verdict it changes:</p>
      <ul className="grid gap-1">
        {changed.map(({ job, change }) => (
          <li key={job.id}>
            <a href={jobHref(job.id)} className="font-bold underline">
              {job.number ?? job.complaint.words}
            </a>
            <span className="block">{changeWords(change)}</span>
          </li>
        ))}
      </ul>
    </div>
  )
}
