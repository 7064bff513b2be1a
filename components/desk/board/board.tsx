'use client'

import { useEffect, useMemo, useRef } from 'react'
import { useThemeAt } from '@/components/field/theme-choice'
import { announce } from '@/components/ui/announce'
import { isDark } from '@/lib/diag/light'
import type { BoardJob, DeskBoard, DeskJob } from '@/lib/model/desk'
import { byExposure } from '@/lib/shop/exposure'
import { may } from '@/lib/shop/permissions'
import { DaylightPanel } from '../daylight/daylight-panel'
import type { BoardActions } from '../desk-actions'
import { useDesk } from '../desk-context'
import { deskPaths, usePickedJob, useSoftJobLinks } from '../desk-path'
import { readSentence } from '../desk-sentences'
import { HandsPanel } from '../hands/hands-panel'
import { ClosingPanel } from '../job/closing-panel'
import { PickedJob } from '../job/picked-job'
import { useJobCase } from '../job/use-job-case'
import { MergePanel } from '../merge/merge-panel'
import { PartsAsked } from '../parts/parts-asked'
import { useBoard, useDeskJob } from '../use-desk-reads'
import { useNow } from '../use-now'
import { boardNews } from './board-news'
import { ClosedJobs } from './closed-jobs'
import { JobsWire } from './jobs-wire'
import { useFresh } from './use-fresh'

type Props = { actions: BoardActions }

/** The board: jobs on the wire, the picked job, and what is to be done about it. */
export function Board({ actions }: Props) {
  const { actor } = useDesk()
  const whose = may(actor.roles, 'job.seeAll') ? 'all' : 'own'
  const board = useBoard(whose)
  const picked = usePickedJob()
  const found = useDeskJob(picked)
  const root = useRef<HTMLElement>(null)
  useSoftJobLinks(root)
  useNews(board.data)
  return (
    <main
      ref={root}
      id="desk-main"
      tabIndex={-1}
      className="desk-board"
      data-picked={picked !== null}
    >
      <Jobs board={board.data} error={board.error} picked={picked} />
      <Picked
        found={found.data}
        error={found.error}
        picked={picked}
        actions={actions}
        open={board.data?.open ?? []}
      />
    </main>
  )
}

type JobsProps = { board: DeskBoard | undefined; error: Error | null; picked: string | null }

function Jobs({ board, error, picked }: JobsProps) {
  const { ports } = useDesk()
  const now = useNow()
  const fresh = useFresh(board?.open, picked)
  const dark = useMemo(
    () =>
      ({ job }: Pick<BoardJob, 'job'>) =>
        now !== null && job.place !== null && isDark(job.place, now),
    [now],
  )
  const rows = useMemo(() => byExposure(board?.open ?? [], (job) => dark({ job })), [board, dark])
  const place = rows.find(({ job }) => job.place !== null)?.job.place ?? null
  useThemeAt(place, ports.now)
  return (
    <section className="desk-jobs" aria-label="Jobs">
      <div className="flex items-end justify-between">
        <h1 className="caps text-figure">{board?.whose === 'own' ? 'My jobs' : 'Open jobs'}</h1>
        <span className="figures text-screen">{board ? rows.length : ''}</span>
      </div>
      {error ? <p className="mt-2 font-bold text-nogo">{readSentence(error)}</p> : null}
      {!board && !error ? <p className="mt-2">Reading the board.</p> : null}
      {board && rows.length === 0 ? <p className="mt-2">No open jobs.</p> : null}
      <JobsWire rows={rows} picked={picked} fresh={fresh} dark={dark} />
      <ClosedJobs rows={board?.closed ?? []} />
    </section>
  )
}

type PickedProps = {
  found: DeskJob | undefined
  error: Error | null
  picked: string | null
  open: readonly BoardJob[]
  actions: BoardActions
}

function Picked({ found, error, picked, actions, open }: PickedProps) {
  const reckoned = useJobCase(found)
  useLandOnLead(picked, found?.job.id ?? null)
  return (
    <>
      <section className="desk-picked" aria-label="The picked job">
        <a href={deskPaths.board} className="desk-back">
          All jobs
        </a>
        {picked === null ? <p className="text-body text-ink2">Pick a job to see it here.</p> : null}
        {error ? <p className="font-bold text-nogo">{readSentence(error)}</p> : null}
        {picked !== null && !found && !error ? <p>Reading the job.</p> : null}
        {found ? <PickedJob found={found} reckoned={reckoned} settle={actions.settle} /> : null}
      </section>
      <section className="desk-aside" aria-label="Daylight, hands, parts and closing">
        {found ? (
          <>
            <DaylightPanel place={found.job.place} />
            <HandsPanel key={found.job.id} found={found} assign={actions.assign} />
            <PartsAsked found={found} move={actions.move} />
            <MergePanel key={`merge ${found.job.id}`} found={found} open={open} actions={actions} />
            <ClosingPanel
              key={`${found.job.id} ${found.job.state === 'closed'}`}
              job={found.job}
              suspects={reckoned.answer?.belief.suspects ?? []}
              close={actions.close}
              reopen={actions.reopen}
            />
          </>
        ) : null}
      </section>
    </>
  )
}

/** The address of a merged job becomes that of the one that goes on (R13). */
function useLandOnLead(picked: string | null, leadId: string | null) {
  useEffect(() => {
    if (picked === null || leadId === null || picked === leadId) return
    window.history.replaceState(null, '', deskPaths.job(leadId))
  }, [picked, leadId])
}

/** Says what changed on the board to people who do not see it move. */
function useNews(board: DeskBoard | undefined) {
  const before = useRef<DeskBoard | undefined>(undefined)
  useEffect(() => {
    if (before.current && board)
      for (const words of boardNews(before.current, board)) announce(words)
    before.current = board
  }, [board])
}
