'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { Suspect } from '@/lib/diag/belief'
import type { Job } from '@/lib/model/job'
import { may } from '@/lib/shop/permissions'
import type { CloseAction, ReopenAction } from '../desk-actions'
import { useDesk } from '../desk-context'
import { useActing } from '../use-acting'
import { CloseBoxes } from './close-boxes'
import { ReopenBoxes } from './reopen-boxes'

type Props = {
  job: Job
  /** Empty while they are being worked out: the cause is then typed. */
  suspects: readonly Suspect[]
  close: CloseAction
  reopen: ReopenAction
}

/** Closing the job with its cause, and opening it again (rules R13, R25), for those who may. */
export function ClosingPanel({ job, suspects, close, reopen }: Props) {
  const { actor } = useDesk()
  const [open, setOpen] = useState(false)
  const { busy, refusal, act } = useActing()
  if (!may(actor.roles, 'job.close')) return null
  const isClosed = job.state === 'closed'
  const head = { jobId: job.id, from: job.state }
  const number = job.number ?? 'The job'
  const shut = (done: boolean) => {
    if (done) setOpen(false)
  }
  return (
    <section className="mt-7">
      <RuleEdge>{isClosed ? 'Reopen the job' : 'Close the job'}</RuleEdge>
      {open ? (
        <>
          {isClosed ? (
            <ReopenBoxes
              busy={busy}
              onSend={(reason) =>
                void act(() => reopen({ ...head, reason }), `${number} is open again.`).then(shut)
              }
            />
          ) : (
            <CloseBoxes
              busy={busy}
              suspects={suspects}
              onSend={(closing) =>
                void act(() => close({ ...head, closing }), `${number} is closed.`).then(shut)
              }
            />
          )}
          <Key small={true} quiet={true} className="mt-2" onClick={() => setOpen(false)}>
            Leave it
          </Key>
        </>
      ) : (
        <Key small={true} className="mt-3" aria-expanded={false} onClick={() => setOpen(true)}>
          {isClosed ? 'Reopen' : 'Close'}
        </Key>
      )}
      {refusal ? <p className="mt-2 font-bold text-nogo">{refusal}</p> : null}
    </section>
  )
}
