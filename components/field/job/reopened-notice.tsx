'use client'

import { useNotices } from '@/components/store/use-notices'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import type { Id } from '@/lib/model/id'
import { clockTime } from '../times'

/** Says that the shop had closed the job and this phone's entry opened it again, until it is seen (R13). */
export function ReopenedNotice({ jobId }: { jobId: Id }) {
  const { notices, seen } = useNotices(jobId)
  const { zone } = useStamp()
  const [notice] = notices
  if (notice === undefined) {
    return null
  }
  return (
    <div role="status" className="grid gap-2 border-y-2 border-ink py-3">
      <p className="font-bold">
        The shop had closed this job. What you wrote came in at{' '}
        <span className="figures">{clockTime(new Date(notice.at).toISOString(), zone)}</span> and
        opened it again. The closing stays on record; call the desk if it should be closed.
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
