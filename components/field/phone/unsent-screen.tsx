'use client'

import { FileDown, ShieldAlert, ShieldCheck } from 'lucide-react'
import { useState } from 'react'
import { of100 } from '@/components/reading-strip/figures'
import { useSession } from '@/components/store/use-session'
import { useSendsClosed, useUnsent } from '@/components/store/use-unsent'
import { Key, KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { WitnessMark } from '@/components/ui/witness-mark'
import { browserDisplay } from '@/lib/ports/display'
import { witnessState } from '../shell'
import { size, span } from '../times'
import { useNow } from '../use-now'
import { counted } from '../words'
import { HandedFiles, useHandingOver } from './hand-over'
import { Items, splitItems } from './unsent-item'
import {
  isNearlyFull,
  letGoOf,
  NEED_WORDS,
  stalledWords,
  standing,
  storageWords,
  titleOf,
} from './unsent-words'

/** What this phone has not handed over yet, why, and the ways to move it. */
export function UnsentScreen() {
  const unsent = useUnsent()
  const sendsClosed = useSendsClosed()
  const now = useNow()
  const { stuck, waiting } = splitItems(unsent.items)
  return (
    <Screen title={titleOf(unsent)} titleHidden foot={<Ways />}>
      <div className="flex flex-wrap items-center gap-5">
        <WitnessMark
          state={witnessState(unsent)}
          count={0}
          letGo={letGoOf(unsent)}
          large
          progress={share(unsent.sending)}
        />
        <p aria-hidden="true" className="caps text-hero">
          {titleOf(unsent)}
        </p>
      </div>
      {unsent.stalled === null ? null : (
        <p role="alert" className="text-row font-bold text-nogo">
          {stalledWords(unsent.stalled, now)}
        </p>
      )}
      <p className="text-row font-bold">{standing(unsent, sendsClosed)}</p>
      {unsent.count > 0 ? (
        <p>
          <b className="figures">{size(unsent.bytes)}</b> in all
          {unsent.oldestAt === null ? null : (
            <>
              , oldest <b className="figures">{span(now - Date.parse(unsent.oldestAt))}</b>
            </>
          )}
        </p>
      ) : null}
      <Needs />
      <Items title="Stuck" items={stuck} />
      <Items title="Waiting" items={waiting} />
      <Storage />
      <Aside />
    </Screen>
  )
}

const share = (sending: { done: number; total: number } | null): number =>
  sending === null || sending.total === 0 ? 0 : sending.done / sending.total

/** What the person must see to, most pressing first. */
function Needs() {
  const { needs, draftsKept, count } = useUnsent()
  return (
    <>
      {draftsKept ? null : (
        <p className="font-bold text-nogo">
          The phone has no room: the last keystrokes are not kept. Delete something else on the
          phone.
        </p>
      )}
      {needs === null ? null : <p className="font-bold">{NEED_WORDS[needs]}</p>}
      {needs === 'signIn' ? (
        <KeyLink small href="/login">
          Sign in
        </KeyLink>
      ) : null}
      {count > 0 && browserDisplay.mayBeCleared() ? (
        <p className="font-bold">
          Put this app on the home screen (the browser’s Share menu). In a tab the phone may clear
          unsent work after seven days.
        </p>
      ) : null}
    </>
  )
}

function Storage() {
  const unsent = useUnsent()
  const full = isNearlyFull(unsent)
  const Shield = unsent.storageKept === true && !full ? ShieldCheck : ShieldAlert
  return (
    <div className="flex items-start gap-3">
      <Shield aria-hidden="true" strokeWidth={2.5} className="shrink-0" />
      <div className="grid gap-1">
        <p>{storageWords(unsent)}</p>
        {full && unsent.quotaShare !== null ? (
          <p className="font-bold text-nogo">
            Nearly full: {of100(unsent.quotaShare)} of 100 parts are used. Photos and voice notes
            stop first; words are kept to the last.
          </p>
        ) : null}
      </div>
    </div>
  )
}

function Aside() {
  const { setAside, letGoCount, filesLetGo } = useUnsent()
  return (
    <>
      {setAside > 0 ? (
        <p>
          {counted(setAside, 'row')} of the shop cannot be read by this version. Kept aside until
          the app is updated.
        </p>
      ) : null}
      {letGoCount > 0 ? (
        <p className="text-second">
          {counted(letGoCount, 'thing')} let go on this phone. The file still holds{' '}
          {letGoCount === 1 ? 'it' : 'them'}.
        </p>
      ) : null}
      {filesLetGo > 0 ? (
        <p className="text-second">
          {counted(filesLetGo, 'photo or voice note', 'photos or voice notes')} let go: no longer on
          this phone. Only a file made before can hold {filesLetGo === 1 ? 'it' : 'them'}.
        </p>
      ) : null}
    </>
  )
}

/** Try sending now, or hand the work over as a file that somebody carries to the desk. */
function Ways() {
  const unsent = useUnsent()
  const session = useSession()
  const [news, setNews] = useState<string | null>(null)
  const trySending = async () => {
    setNews('Calling the shop.')
    await unsent.trySending()
    setNews(null)
  }
  const handing = useHandingOver()
  const failed = () => setNews('That did not work. Everything is still saved on this phone.')
  return (
    <>
      <p role="status" className="text-second font-bold empty:hidden">
        {news}
      </p>
      <HandedFiles
        handing={handing}
        after="Whoever holds it can read it. The desk takes it in; here it stays unsent until the shop has it."
      />
      {unsent.count > 0 || unsent.letGoCount > 0 ? (
        <Key
          onClick={() => {
            handing.begin().catch(failed)
          }}
        >
          <FileDown aria-hidden="true" strokeWidth={2.5} />
          Hand over by file
        </Key>
      ) : null}
      <Key
        kind="main"
        disabled={session.kind !== 'ready'}
        onClick={() => {
          trySending().catch(failed)
        }}
      >
        {unsent.count === 0 ? 'Call the shop now' : 'Try sending now'}
      </Key>
    </>
  )
}
