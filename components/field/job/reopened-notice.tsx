'use client'

import { useJobZone } from '@/components/store/use-job-zone'
import { useNotices } from '@/components/store/use-notices'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import type { Id } from '@/lib/model/id'
import { useNow } from '../use-now'
import { whenWords } from '../when-words'

/** Says that the shop had closed the job and this phone's entry opened it again, until it is seen (R13). */
export function ReopenedNotice({ jobId }: { jobId: Id }) {
  const { notices, seen } = useNotices(jobId)
  const zone = useJobZone(jobId)
  const now = useNow()
  const [notice] = notices
  if (notice === undefined) {
    return null
  }
  return (
    <div role="status" className="grid gap-2 border-y-2 border-ink py-3">
      <p className="font-bold">
        The shop had closed this job. What you wrote came in at{' '}
        <span className="figures">{whenWords(new Date(notice.at).toISOString(), zone, now)}</span>{' '}
        and opened it again. The closing stays on record; call the desk if it should be closed.
      </p>
      <Key
        small
        onClick={() => {
          seen().catch(() => announce('That did not work. Try again.', 'assertive'))
        }}
      >
        Seen
      </Key>
    </div>
  )
}
