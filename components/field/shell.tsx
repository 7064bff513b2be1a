'use client'

import { lazy, type ReactNode, Suspense, useEffect, useRef } from 'react'
import { useLost } from '@/components/store/use-lost'
import { useJob, useMachines, useModels } from '@/components/store/use-rows'
import { useSilent } from '@/components/store/use-silent'
import { useUnsent } from '@/components/store/use-unsent'
import { useAppUpdate } from '@/components/store/use-updates'
import { announce } from '@/components/ui/announce'
import { classes } from '@/components/ui/class-names'
import { JobTag } from '@/components/ui/job-tag'
import { Key } from '@/components/ui/key'
import { LiveRegion } from '@/components/ui/live-region'
import { Tabs } from '@/components/ui/tabs'
import { TaskHeader } from '@/components/ui/task-header'
import { shownTitle } from '@/components/ui/title-focus'
import { WitnessMark, type WitnessState } from '@/components/ui/witness-mark'
import { WARN_SHARE } from '@/lib/sync/client/room'
import { StoreTrouble } from './phone/store-trouble'
import { backOf, isForm, type JobTab, jobHref, type Route } from './route'
import { useRoute } from './router'
import { ThemeKey } from './theme-key'
import { useThemeByTheSun } from './use-theme'
import { machineName } from './words'

const TABS: readonly JobTab[] = ['job', 'checks', 'log', 'parts']
const TAB_WORDS: Record<JobTab, string> = {
  job: 'Job',
  checks: 'Checks',
  log: 'Log',
  parts: 'Parts',
}

/** Everything around a screen: skip link, header, tabs, live regions, the bar that offers a new version. */
export function Shell({ route, children }: { route: Route; children: ReactNode }) {
  useThemeByTheSun()
  useSendingNews()
  useFocusOnArrival(route)
  const jobId = 'jobId' in route ? route.jobId : null
  const held = useJob(jobId ?? '') !== null
  const tab = held ? TABS.find((name) => name === route.name) : undefined
  return (
    <div
      className={classes(
        'mx-auto flex min-h-dvh max-w-column flex-col',
        tab !== undefined && 'has-tabs',
      )}
    >
      <a
        href="#main"
        className="visually-hidden focus:[clip-path:none] focus:static! focus:h-auto! focus:w-auto! focus:p-3"
      >
        Skip to the screen
      </a>
      <header className="safe-sides flex flex-wrap items-center gap-2 pt-[max(0.5rem,env(safe-area-inset-top))] pb-2">
        <Header route={route} onTab={tab !== undefined} />
      </header>
      {isForm(route) ? null : <UpdateBar />}
      <StoreTrouble />
      <Notices />
      <main id="main" className="flex flex-1 flex-col">
        {children}
      </main>
      {tab !== undefined && jobId !== null ? (
        <div className="tabs-bar safe-bottom bg-ground">
          <Tabs
            label="Job"
            tabs={TABS.map((name) => ({
              label: TAB_WORDS[name],
              href: jobHref(jobId, name === 'job' ? '' : name),
              current: name === tab,
            }))}
          />
        </div>
      ) : null}
      <LiveRegion />
    </div>
  )
}

const LostNotice = lazy(() =>
  import('./phone/lost-notice').then((file) => ({ default: file.LostNotice })),
)
const SilentNotice = lazy(() =>
  import('./phone/silent-notice').then((file) => ({ default: file.SilentNotice })),
)

const Withdrawals = lazy(() =>
  import('./phone/withdrawals').then((file) => ({ default: file.Withdrawals })),
)

/** What hardly ever is to be said is fetched when it is. */
function Notices() {
  const isLost = useLost().lost !== null
  const isSilent = useSilent().silent !== null
  return (
    <Suspense fallback={null}>
      {isLost ? <LostNotice /> : null}
      {isSilent ? <SilentNotice /> : null}
      <Withdrawals />
    </Suspense>
  )
}

function Header({ route, onTab }: { route: Route; onTab: boolean }) {
  const back = backOf(route)
  const tag = 'jobId' in route ? <TagOf jobId={route.jobId} /> : <Name />
  if (back !== null) {
    return (
      <div className="w-full">
        <TaskHeader backHref={back.href} backLabel={back.label} tag={tag} witness={<Witness />} />
      </div>
    )
  }
  return (
    <>
      <div className="min-w-36 flex-1">{tag}</div>
      {onTab ? null : <ThemeKey />}
      <Witness />
    </>
  )
}

const Name = () => <p className="caps text-plate">Farbench</p>

function TagOf({ jobId }: { jobId: string }) {
  const job = useJob(jobId)
  const machine = useMachines()?.find((m) => m.id === job?.machineId)
  const models = useModels()
  if (!job) {
    return <Name />
  }
  return (
    <JobTag
      complaint={job.complaint.words}
      number={job.number}
      machine={machineName(machine, models)}
      href={jobHref(jobId)}
      compact
    />
  )
}

function Witness() {
  const unsent = useUnsent()
  const sending = unsent.sending
  return (
    <WitnessMark
      id="witness"
      href="/field/unsent"
      state={witnessState(unsent)}
      count={unsent.count}
      letGo={unsent.letGoCount + unsent.filesLetGo}
      progress={sending === null || sending.total === 0 ? 0 : sending.done / sending.total}
    />
  )
}

/** Stuck work outshouts what does not move, that outshouts sending, sending outshouts waiting. */
export function witnessState(of: {
  counted: boolean
  count: number
  stuckCount: number
  sending: unknown
  stalled: unknown
}): WitnessState {
  if (of.stuckCount > 0) {
    return 'stuck'
  }
  if (!of.counted) {
    return 'opening'
  }
  if (of.count === 0) {
    return 'whole'
  }
  if (of.stalled !== null) {
    return 'late'
  }
  return of.sending === null ? 'broken' : 'sending'
}

type Counts = { count: number; letGo: number }

/** What is said when the count of unsent things changes; a buzz only when the shop took the last one. */
export function countNews(was: Counts, is: Counts): { words: string; buzz: boolean } | null {
  if (is.count > was.count) {
    return { words: `${is.count} not sent. All of it is saved on this phone.`, buzz: false }
  }
  if (is.count > 0 || was.count === 0) {
    return null
  }
  if (is.letGo > was.letGo) {
    return { words: 'Nothing waits any more.', buzz: false }
  }
  const words =
    is.letGo === 0 ? 'Everything you recorded is at the shop.' : 'The rest is at the shop.'
  return { words, buzz: true }
}

/** Says when the last thing was accepted (with one short buzz) and, at once, when something is stuck. */
function useSendingNews(): void {
  const { count, stuckCount, storageKept, stalled, quotaShare, letGoCount, filesLetGo } =
    useUnsent()
  const letGo = letGoCount + filesLetGo
  const isHalted = stalled !== null
  const isFull = (quotaShare ?? 0) >= WARN_SHARE
  const before = useRef({ count: 0, stuck: 0, letGo: 0 })
  useEffect(() => {
    const was = before.current
    before.current = { count, stuck: stuckCount, letGo }
    const news = countNews(was, { count, letGo })
    if (news !== null) {
      announce(news.words)
    }
    if (news?.buzz && 'vibrate' in navigator) {
      navigator.vibrate(30)
    }
    if (stuckCount > was.stuck) {
      announce(`${stuckCount} stuck. Open the list of unsent work.`, 'assertive')
    }
  }, [count, stuckCount, letGo])
  useEffect(() => {
    if (storageKept === false && count > 0) {
      announce('The phone may clear this store when it runs short of room.', 'assertive')
    }
  }, [storageKept, count])
  useEffect(() => {
    if (isHalted) {
      announce('Nothing is being sent. Open the list of unsent work.', 'assertive')
    }
  }, [isHalted])
  useEffect(() => {
    if (isFull) {
      announce('The phone’s room for this app is nearly full.', 'assertive')
    }
  }, [isFull])
}

/** A new screen is read from its title; leaving the list of unsent work leads back to the mark. */
function useFocusOnArrival(route: Route): void {
  const { here } = useRoute()
  const before = useRef<{ here: string; name: Route['name'] } | null>(null)
  useEffect(() => {
    const was = before.current
    before.current = { here, name: route.name }
    if (was !== null && was.here !== here) {
      const target =
        was.name === 'unsent'
          ? document.getElementById('witness')
          : shownTitle(document.querySelectorAll<HTMLElement>('#screen-title'))
      target?.focus({ preventScroll: true })
    }
  }, [here, route.name])
}

function UpdateBar() {
  const { waiting, apply } = useAppUpdate()
  if (!waiting) {
    return null
  }
  return (
    <div className="safe-sides flex flex-wrap items-center gap-3 border-y-2 border-ink py-2">
      <p className="min-w-40 flex-1 font-bold">
        New version is ready. Everything recorded is kept.
      </p>
      <Key small onClick={apply}>
        Take it now
      </Key>
    </div>
  )
}
