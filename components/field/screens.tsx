'use client'

import { type ComponentType, lazy, type ReactNode, Suspense, useEffect } from 'react'
import { useJob } from '@/components/store/use-rows'
import { Screen } from '@/components/ui/screen'
import { JobsScreen } from './jobs-screen'
import type { Route } from './route'
import { useRoute } from './router'

/** A screen that is fetched when it is first wanted, from what the phone holds. */
function later<P extends object>(fetch: () => Promise<ComponentType<P>>) {
  return lazy(async () => ({ default: await fetch() }))
}

const CheckScreen = later(() =>
  import('@/components/checks/check-screen').then((file) => file.CheckScreen),
)
const ChecksScreen = later(() =>
  import('@/components/checks/checks-screen').then((file) => file.ChecksScreen),
)
const ReadingScreen = later(() =>
  import('@/components/checks/reading-screen').then((file) => file.ReadingScreen),
)
const SwapScreen = later(() =>
  import('@/components/checks/swap-screen').then((file) => file.SwapScreen),
)
const FixScreen = later(() =>
  import('@/components/outcome/fix-screen').then((file) => file.FixScreen),
)
const ProofScreen = later(() =>
  import('@/components/outcome/proof-screen').then((file) => file.ProofScreen),
)
const WayOutScreen = later(() =>
  import('@/components/outcome/way-out-screen').then((file) => file.WayOutScreen),
)
const AskPartScreen = later(() =>
  import('@/components/parts/ask-part-screen').then((file) => file.AskPartScreen),
)
const PartsScreen = later(() =>
  import('@/components/parts/parts-screen').then((file) => file.PartsScreen),
)
const JobsBook = later(() => import('@/components/store/jobs-book').then((file) => file.JobsBook))
const NotHere = later(() => import('./not-here').then((file) => file.NotHere))
const SignedOut = later(() => import('./signed-out').then((file) => file.SignedOut))
const JobScreen = later(() => import('./job/job-screen').then((file) => file.JobScreen))
const LogScreen = later(() => import('./log/log-screen').then((file) => file.LogScreen))
const CodesScreen = later(() => import('./codes/codes-screen').then((file) => file.CodesScreen))
const IntakeScreen = later(() => import('./intake/intake-screen').then((file) => file.IntakeScreen))
const SheetScreen = later(() => import('./job/sheet-screen').then((file) => file.SheetScreen))
const CorrectScreen = later(() => import('./log/correct-screen').then((file) => file.CorrectScreen))
const EntryScreen = later(() => import('./log/entry-screen').then((file) => file.EntryScreen))
const NewEntryScreen = later(() =>
  import('./log/new-entry-screen').then((file) => file.NewEntryScreen),
)
const JobSettingScreen = later(() =>
  import('./settings/job-setting-screen').then((file) => file.JobSettingScreen),
)
const AboutScreen = later(() => import('./phone/about-screen').then((file) => file.AboutScreen))
const UnsentScreen = later(() => import('./phone/unsent-screen').then((file) => file.UnsentScreen))

type Props = {
  route: Route /** Set when nobody is at work here. */
  signedOut: { emptied: boolean } | null
}

/** The screen of a route. The jobs come with the app; the others are fetched when first wanted. */
export function Screens({ route, signedOut }: Props) {
  return (
    <Suspense
      fallback={
        <Screen title="Opening" titleHidden>
          {null}
        </Screen>
      }
    >
      {signedOut === null ? (
        <LandOnLead route={route}>
          <OneScreen route={route} />
        </LandOnLead>
      ) : (
        <SignedOut emptied={signedOut.emptied} />
      )}
    </Suspense>
  )
}

/**
 * A job that this phone does not hold is said to be none, on every screen of it, and not to be opening for ever.
 * The address of a merged job becomes that of the one that goes on (R13), once this phone holds it.
 */
function LandOnLead({ route, children }: { route: Route; children: ReactNode }) {
  const { here, go } = useRoute()
  const jobId = 'jobId' in route ? route.jobId : ''
  const job = useJob(jobId)
  const leadId = job?.mergedInto
  const isHeld = useJob(leadId ?? '')
  const moves = leadId !== undefined && isHeld !== null && isHeld !== undefined
  useEffect(() => {
    if (moves) go(here.replace(jobId, leadId), { replace: true, from: here })
  }, [moves, go, here, jobId, leadId])
  if (job === null && 'jobId' in route) return <NotHere what="job" />
  if (moves) return null
  return jobId === '' ? children : <JobsBook jobId={jobId}>{children}</JobsBook>
}

function OneScreen({ route }: { route: Route }) {
  switch (route.name) {
    case 'jobs':
      return <JobsScreen />
    case 'new':
      return <IntakeScreen />
    case 'unsent':
      return <UnsentScreen />
    case 'about':
      return <AboutScreen />
    case 'job':
      return <JobScreen jobId={route.jobId} />
    case 'sheet':
      return <SheetScreen jobId={route.jobId} />
    case 'codes':
      return <CodesScreen jobId={route.jobId} />
    case 'log':
      return <LogScreen jobId={route.jobId} />
    case 'entry':
      return <EntryScreen jobId={route.jobId} entryId={route.entryId} />
    case 'correct':
      return <CorrectScreen jobId={route.jobId} entryId={route.entryId} />
    case 'note':
    case 'symptom':
    case 'photo':
    case 'voice':
      return <NewEntryScreen name={route.name} jobId={route.jobId} />
    case 'checks':
      return <ChecksScreen jobId={route.jobId} />
    case 'check':
      return <CheckScreen jobId={route.jobId} checkId={route.checkId} />
    case 'reading':
      return <ReadingScreen jobId={route.jobId} checkId={route.checkId} />
    case 'swap':
      return <SwapScreen jobId={route.jobId} swapId={route.swapId} />
    case 'fix':
      return <FixScreen jobId={route.jobId} />
    case 'proof':
      return <ProofScreen jobId={route.jobId} />
    case 'wayOut':
      return <WayOutScreen jobId={route.jobId} />
    case 'parts':
      return <PartsScreen jobId={route.jobId} />
    case 'askPart':
      return <AskPartScreen jobId={route.jobId} />
    case 'setPlace':
    case 'setAir':
    case 'setComplaint':
    case 'setMachine':
      return <JobSettingScreen name={route.name} jobId={route.jobId} />
    case 'unknown':
      return <NotHere what="screen" />
  }
}
