'use client'

import { useState } from 'react'
import { entryWords, kindWord } from '@/components/log/entry-words'
import { useStamp } from '@/components/store/use-stamp'
import { type UnsentItem, type UnsentView, useUnsent } from '@/components/store/use-unsent'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { LogIcon, type LogShape } from '@/components/ui/log-icon'
import { Row } from '@/components/ui/row'
import { RuleEdge } from '@/components/ui/rule-edge'
import { browserDisplay } from '@/lib/ports/display'
import { size, span } from '../times'
import { useNow } from '../use-now'
import { whenWords } from '../when-words'
import { LetGo } from './let-go'

const SHAPES: Record<UnsentItem['kind'], LogShape> = {
  'machine.add': 'ring',
  'job.open': 'triangle',
  'job.move': 'flag',
  'job.people': 'ring',
  'job.machine': 'flag',
  'log.add': 'ring',
  'partRequest.ask': 'hexagon',
  'advice.keep': 'flag',
  'job.set': 'triangle',
  'machine.set': 'ring',
  'job.settle': 'triangle',
  'machine.settle': 'ring',
  'partLine.add': 'hexagon',
  'partLine.cancel': 'hexagon',
  'partLine.quantity': 'hexagon',
  'partRequest.drop': 'hexagon',
  'machine.drop': 'ring',
  'book.heard': 'flag',
  photoBytes: 'frame',
}

/** Shape and words of an item: a line of the log by its kind, as the log shows it. */
const shown = ({
  kind,
  what,
}: Pick<UnsentItem, 'kind' | 'what'>): { shape: LogShape; words: string } =>
  typeof what === 'string'
    ? { shape: SHAPES[kind], words: what }
    : { shape: entryWords(what, null).shape, words: kindWord(what) }

const nameOf = (what: UnsentItem['what']): string =>
  typeof what === 'string' ? what : kindWord(what)

/** A heading and the things under it; nothing when there are none. */
export function Items({ title, items }: { title: string; items: readonly UnsentItem[] }) {
  if (items.length === 0) {
    return null
  }
  return (
    <section>
      <RuleEdge end={String(items.length)}>{title}</RuleEdge>
      <ul>
        {items.map((item) => (
          <Item key={item.key} item={item} />
        ))}
      </ul>
    </section>
  )
}

function Item({ item }: { item: UnsentItem }) {
  const { zone } = useStamp()
  const now = useNow()
  return (
    <li>
      <Row
        icon={<LogIcon shape={shown(item).shape} />}
        title={shown(item).words}
        second={`${itemWords(item)}${ageWords(item, now)}`}
        end={whenWords(item.since, zone, now)}
        endSecond={size(item.bytes)}
      />
      {item.state === 'stuck' ? <StuckWays item={item} /> : null}
    </li>
  )
}

/** How long it has lain here: unsent work is never shown without its age (F14). */
export function ageWords({ reason, waitsFor, since }: UnsentItem, now: number): string {
  const isClosed = waitsFor === null && reason !== null
  return `${isClosed ? ' ' : ', '}${isClosed ? 'Recorded' : 'recorded'} ${span(now - Date.parse(since))} ago`
}

/** What its state is and, when it is stuck or waits, why. */
export function itemWords(item: UnsentItem): string {
  const part = item.bytesDone > 0 ? `, ${size(item.bytesDone)} of it is at the shop` : ''
  const state: Record<UnsentItem['state'], string> = {
    waiting: item.kind === 'photoBytes' ? `Goes after the words${part}` : 'Waits for signal',
    sending: `Going out now${part}`,
    stuck: 'Stuck',
    blocked: 'Waits for another entry',
  }
  if (item.waitsFor !== null) {
    const { what, isStuck } = item.waitsFor
    return `${state[item.state]}: “${nameOf(what)}”${isStuck ? ', which is stuck' : ''}`
  }
  return item.reason === null ? state[item.state] : `${state[item.state]}: ${item.reason}`
}

/** What to do about a refusal, by its code. */
const ADVICE: Readonly<Record<string, string>> = {
  stale_status: 'Do it again from where it stands now, or let it go.',
  forbidden: 'Ask the owner for the role, or have them take the file in at the desk.',
  not_yours: 'Hand it over by file, so that the shop can look at it.',
  too_big: 'Copy the words out and record them in shorter pieces, then let this go.',
  invalid: 'Copy the words out and record them anew, then let this go.',
  id_reuse: 'Copy the words out and record them anew, then let this go.',
  no_parent: 'Hand it over by file, or record it anew in a job the shop has.',
  unknown_kind: 'Hand it over by file, or wait until the shop’s server is updated.',
}
const ADVICE_ELSE = 'Hand it over by file, then let it go.'

/** What a refusal's code lets a person do. */
export const adviceOf = (item: Pick<UnsentItem, 'code'>): string =>
  ADVICE[item.code ?? ''] ?? ADVICE_ELSE

/** Keys of something stuck: do it again, copy its words out, let it go. */
function StuckWays({ item }: { item: UnsentItem }) {
  const unsent = useUnsent()
  const [news, setNews] = useState<string | null>(null)
  const say = (words: string) => {
    setNews(words)
    announce(words)
  }
  const redo = async () => {
    const again = await unsent.redo(item)
    if (again.ok) announce(`${nameOf(item.what)}: made again from where it stands now.`)
    else say(again.problem.words)
  }
  const copy = async () => {
    const done = await browserDisplay.copy(item.words ?? '')
    say(done ? 'Words copied.' : 'The browser does not let words be copied. Hand over by file.')
  }
  const failed = () => say('That did not work. It is still here.')
  return (
    <div className="grid gap-2 border-b-[1.5px] border-rule pb-3">
      <p className="text-second">{adviceOf(item)}</p>
      <p role="status" className="text-second font-bold empty:hidden">
        {news}
      </p>
      {item.code === 'stale_status' ? (
        <Key small onClick={() => void redo().catch(failed)}>
          Redo from here
        </Key>
      ) : null}
      {item.words === null ? null : (
        <Key small quiet onClick={() => void copy().catch(failed)}>
          Copy the words out
        </Key>
      )}
      <LetGo item={item} name={nameOf(item.what)} failed={failed} />
    </div>
  )
}

/** Stuck and blocked things first, then what goes by itself. */
export function splitItems(items: UnsentView['items']): {
  stuck: UnsentItem[]
  waiting: UnsentItem[]
} {
  const isHeld = (item: UnsentItem) => item.state === 'stuck' || item.state === 'blocked'
  return { stuck: items.filter(isHeld), waiting: items.filter((item) => !isHeld(item)) }
}
