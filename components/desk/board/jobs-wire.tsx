'use client'

import { JobTag } from '@/components/ui/job-tag'
import { WitnessMark } from '@/components/ui/witness-mark'
import type { BoardJob } from '@/lib/model/desk'
import type { Job } from '@/lib/model/job'
import { EXPOSURES, type Exposure, exposureOf } from '@/lib/shop/exposure'
import { JOB_STATE_WORDS, WAY_OUT_WORDS } from '../../field/words'
import { useDesk } from '../desk-context'
import { deskPaths } from '../desk-path'
import { useNow } from '../use-now'
import { inWords } from './in-words'

type Props = {
  rows: readonly BoardJob[]
  picked: string | null
  /** Entries that came in since the job was last looked at on this desk. */
  fresh: ReadonlyMap<string, number>
  dark: (row: BoardJob) => boolean
}

/** Open jobs strung on a wire, the most exposed first. */
export function JobsWire({ rows, picked, fresh, dark }: Props) {
  return (
    <ol className="desk-wire">
      {rows.map((row) => (
        <li key={row.job.id}>
          <div className="flex items-center gap-3">
            <JobTag
              className="min-w-0 flex-1"
              complaint={row.job.complaint.words}
              number={row.job.number}
              machine={row.machineWords}
              href={deskPaths.job(row.job.id)}
              current={row.job.id === picked}
            />
            {row.photosMissing > 0 ? (
              <WitnessMark state="broken" count={row.photosMissing} />
            ) : null}
          </div>
          <BelowTag row={row} fresh={fresh.get(row.job.id) ?? 0} dark={dark(row)} />
        </li>
      ))}
    </ol>
  )
}

/** What makes the people of a job exposed, in words; null when nothing is known to. */
function exposureWords(exposure: Exposure, { hurt, missing }: Job['people']): string | null {
  switch (exposure) {
    case 'hurtOrMissing':
      return [hurt && 'hurt', missing && 'missing'].filter(Boolean).join(', ')
    case 'exposedAndStill':
      return 'exposed'
    case 'noPosition':
      return 'no position'
    case 'aloneInTheDark':
      return 'alone, dark'
    case 'inTheField':
    case 'safe':
      return null
  }
}

function BelowTag({ row, fresh, dark }: { row: BoardJob; fresh: number; dark: boolean }) {
  const { shop } = useDesk()
  const now = useNow()
  const { job } = row
  const exposure = exposureOf(job, dark)
  const words = exposureWords(exposure, job.people)
  return (
    <p className="mt-1 flex flex-wrap items-baseline gap-x-2 pl-12 text-second text-ink2">
      {words ? (
        <strong
          className={EXPOSURES[exposure] < 4 ? 'caps text-row text-nogo' : 'caps text-row text-ink'}
        >
          {words}
        </strong>
      ) : null}
      <strong className="caps text-row text-ink">
        {job.wayOut ? WAY_OUT_WORDS[job.wayOut] : JOB_STATE_WORDS[job.state]}
      </strong>
      <span>{inWords(row, { zone: shop.zone, now })}</span>
      {fresh > 0 ? <span className="desk-count">{fresh} new</span> : null}
    </p>
  )
}
