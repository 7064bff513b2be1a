'use client'

import { FileDown, ShieldAlert, ShieldCheck } from 'lucide-react'
import { type ReactNode, useState } from 'react'
import { entryWords } from '@/components/log/entry-words'
import { of100 } from '@/components/reading-strip/figures'
import { useSession } from '@/components/store/use-session'
import { useStamp } from '@/components/store/use-stamp'
import { type UnsentItem, type UnsentView, useUnsent } from '@/components/store/use-unsent'
import { announce } from '@/components/ui/announce'
import { Key, KeyLink } from '@/components/ui/key'
import { LogIcon, type LogShape } from '@/components/ui/log-icon'
import { Row } from '@/components/ui/row'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Screen } from '@/components/ui/screen'
import { WitnessMark } from '@/components/ui/witness-mark'
import { witnessState } from '../shell'
import { clockTime, size, span } from '../times'
import { useNow } from '../use-now'
import { counted } from '../words'

const titleOf = ({ counted: known, count }: { counted: boolean; count: number }): string =>
  !known ? 'Counting' : count === 0 ? 'All sent' : `${count} not sent`

/** What this phone has not handed over yet, why, and the two ways to move it. */
export function UnsentScreen() {
  const unsent = useUnsent()
  const now = useNow()
  const state = witnessState(unsent)
  const stuck = unsent.items.filter((item) => item.state === 'stuck' || item.state === 'blocked')
  const waiting = unsent.items.filter((item) => !stuck.includes(item))
  return (
    <Screen title={titleOf(unsent)} titleHidden foot={<Ways />}>
      <div className="flex flex-wrap items-center gap-5">
        <WitnessMark state={state} count={0} large progress={share(unsent.sending)} />
        <p aria-hidden="true" className="caps text-hero">
          {titleOf(unsent)}
        </p>
      </div>
      <p className="text-row font-bold">{standing(unsent)}</p>
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
      {unsent.setAside > 0 ? (
        <p>
          {counted(unsent.setAside, 'row')} of the shop cannot be read by this version. Kept aside
          until the app is updated.
        </p>
      ) : null}
    </Screen>
  )
}

const share = (sending: { done: number; total: number } | null): number =>
  sending === null || sending.total === 0 ? 0 : sending.done / sending.total

function standing(unsent: ReturnType<typeof useUnsent>): string {
  if (!unsent.counted) {
    return 'Counting what this phone holds.'
  }
  if (unsent.count === 0) {
    return 'Everything recorded on this phone is at the shop.'
  }
  if (unsent.sending !== null) {
    return `Sending: ${unsent.sending.done} of ${unsent.sending.total} taken by the shop. All of it stays saved on this phone until then.`
  }
  return 'All of it is saved on this phone. With signal and this open, it goes by itself.'
}

const NEED_WORDS: Record<NonNullable<UnsentView['needs']>, string> = {
  signIn: 'The shop asks you to sign in again. Unsent work is kept and still goes out.',
  updateApp:
    'The shop needs a newer version of this app. Load it with signal; unsent work is kept.',
  refused:
    'The shop does not take work from this phone at the moment. Everything is kept here. Call the shop.',
}

function Needs() {
  const { needs, draftsKept } = useUnsent()
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
    </>
  )
}

/** Shape and words of an item: a line of the log by its kind, as the log shows it. */
const shown = ({ kind, what }: UnsentItem): { shape: LogShape; words: string } => {
  if (typeof what === 'string') return { shape: SHAPES[kind], words: what }
  const { shape, kind: words } = entryWords(what, null)
  return { shape, words }
}

const SHAPES: Record<UnsentItem['kind'], LogShape> = {
  'machine.add': 'ring',
  'job.open': 'triangle',
  'job.move': 'flag',
  'job.people': 'ring',
  'job.machine': 'flag',
  'log.add': 'ring',
  'partRequest.ask': 'hexagon',
  'advice.keep': 'flag',
  photoBytes: 'frame',
}

function Items({ title, items }: { title: string; items: readonly UnsentItem[] }) {
  const { zone } = useStamp()
  if (items.length === 0) {
    return null
  }
  return (
    <section>
      <RuleEdge end={String(items.length)}>{title}</RuleEdge>
      <ul>
        {items.map((item) => (
          <li key={item.key}>
            <Row
              icon={<LogIcon shape={shown(item).shape} />}
              title={shown(item).words}
              second={itemWords(item)}
              end={clockTime(item.since, zone)}
              endSecond={size(item.bytes)}
            />
          </li>
        ))}
      </ul>
    </section>
  )
}

function itemWords(item: UnsentItem): ReactNode {
  const state = {
    waiting: item.kind === 'photoBytes' ? 'The picture goes after the words' : 'Waits for signal',
    sending: 'Going out now',
    stuck: 'Stuck',
    blocked: 'Waits for another entry',
  }[item.state]
  return item.reason === null ? state : `${state}: ${item.reason}`
}

function Storage() {
  const { storageKept, quotaShare } = useUnsent()
  const room =
    quotaShare === null ? '' : ` Of its room, ${of100(quotaShare)} of 100 parts are used.`
  if (storageKept === true) {
    return (
      <p className="flex items-start gap-3">
        <ShieldCheck aria-hidden="true" strokeWidth={2.5} className="shrink-0" />
        <span>Storage is kept: the phone will not clear it.{room}</span>
      </p>
    )
  }
  return (
    <p className="flex items-start gap-3">
      <ShieldAlert aria-hidden="true" strokeWidth={2.5} className="shrink-0" />
      <span>
        {storageKept === null
          ? 'Storage: the phone was not asked yet.'
          : 'Storage is not promised: a phone short of room may clear it. Put the app on the home screen, and send soon.'}
        {room}
      </span>
    </p>
  )
}

/** Try sending now, or hand the work over as a file that somebody carries out. */
function Ways() {
  const unsent = useUnsent()
  const session = useSession()
  const stamp = useStamp()
  const [news, setNews] = useState<string | null>(null)
  const trySending = async () => {
    setNews('Calling the shop.')
    await unsent.trySending()
    setNews(null)
  }
  const handOver = async () => {
    const file = await unsent.exportFile()
    const name = `farbench-unsent-${stamp.now().slice(0, 16).replace(/[:T]/g, '-')}.json`
    download(file, name)
    setNews(`Saved as ${name}. It stays unsent here until the shop has it.`)
    announce('File saved.')
  }
  const failed = () => setNews('That did not work. Everything is still saved on this phone.')
  return (
    <>
      <p role="status" className="text-second font-bold empty:hidden">
        {news}
      </p>
      {unsent.count > 0 ? (
        <Key
          onClick={() => {
            handOver().catch(failed)
          }}
        >
          <FileDown aria-hidden="true" strokeWidth={2.5} />
          Hand over by file
        </Key>
      ) : null}
      <Key
        kind="main"
        disabled={session.kind !== 'ready' || unsent.sending !== null}
        onClick={() => {
          trySending().catch(failed)
        }}
      >
        {unsent.count === 0 ? 'Call the shop now' : 'Try sending now'}
      </Key>
    </>
  )
}

function download(file: Blob, name: string): void {
  const url = URL.createObjectURL(file)
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 60_000)
}
