'use client'

import { CheckScreen } from '@/components/checks/check-screen'
import { ChecksScreen } from '@/components/checks/checks-screen'
import { ReadingScreen } from '@/components/checks/reading-screen'
import { SwapScreen } from '@/components/checks/swap-screen'
import { FixScreen } from '@/components/outcome/fix-screen'
import { ProofScreen } from '@/components/outcome/proof-screen'
import { WayOutScreen } from '@/components/outcome/way-out-screen'
import { AskPartScreen } from '@/components/parts/ask-part-screen'
import { PartsScreen } from '@/components/parts/parts-screen'
import { KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { CodesScreen } from './codes/codes-screen'
import { IntakeScreen } from './intake/intake-screen'
import { JobScreen } from './job/job-screen'
import { SheetScreen } from './job/sheet-screen'
import { JobsScreen } from './jobs-screen'
import { CorrectScreen } from './log/correct-screen'
import { EntryScreen } from './log/entry-screen'
import { LogScreen } from './log/log-screen'
import { NoteScreen } from './log/note-screen'
import { PhotoScreen } from './log/photo-screen'
import { AboutScreen } from './phone/about-screen'
import { UnsentScreen } from './phone/unsent-screen'
import type { Route } from './route'

/** The screen of a route. */
export function Screens({ route }: { route: Route }) {
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
      return <NoteScreen jobId={route.jobId} />
    case 'photo':
      return <PhotoScreen jobId={route.jobId} />
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
    case 'unknown':
      return <Unknown />
  }
}

function Unknown() {
  return (
    <Screen
      title="Nothing here"
      foot={
        <KeyLink kind="main" href="/field">
          Jobs on this phone
        </KeyLink>
      }
    >
      <p>There is no screen at this address.</p>
    </Screen>
  )
}
