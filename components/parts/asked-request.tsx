'use client'
import { useState } from 'react'
import type { PartRequestRow } from '@/lib/model/part-request'
import { CHOICE_WORDS, LINE_STATE_WORDS, URGENCY_WORDS } from '@/lib/shop/part-words'
import type { OpInput } from '@/lib/sync/protocol/op'
import { useMay } from '../checks/use-may'
import { NotSaved, useSave } from '../checks/use-save'
import { useNow } from '../field/use-now'
import { whenWords } from '../field/when-words'
import { announce } from '../ui/announce'
import { Hold } from '../ui/hold'
import { Key } from '../ui/key'
import { Row } from '../ui/row'

type Line = PartRequestRow['lines'][number]
type Act = (ops: OpInput[], words: string) => Promise<void>

/** One request as asked: each line, and what may still be changed of it (M6 to M8). */
export function AskedRequest({ request, zone }: { request: PartRequestRow; zone: string }) {
  const { save, saving, problem } = useSave()
  const mine = useMay('part.ask')
  const now = useNow()
  const act: Act = async (ops, words) => {
    if (await save(ops)) announce(words)
  }
  return (
    <>
      {request.lines.map((line) => (
        <li key={line.id}>
          <Row
            title={`${line.words}, ${line.quantity}`}
            second={`${CHOICE_WORDS[line.choice]}${line.number === null ? '' : `, ${line.number}`}. ${URGENCY_WORDS[request.urgency]}, asked ${whenWords(request.askedAt, zone, now)}.`}
            end={<span className="caps text-section">{LINE_STATE_WORDS[line.state]}</span>}
          />
          {mine && line.state === 'asked' ? (
            <LineKeys request={request} line={line} busy={saving} act={act} />
          ) : null}
        </li>
      ))}
      {request.note !== null && <li className="py-1 text-second text-ink2">{request.note}</li>}
      {request.revived === true ? (
        <li className="py-1 text-second">
          It was taken back on one phone and changed on another, so it stands.
        </li>
      ) : null}
      {mine && isUntouched(request) ? (
        <li className="py-1">
          <TakeBack request={request} busy={saving} act={act} />
        </li>
      ) : null}
      {problem === null ? null : (
        <li>
          <NotSaved problem={problem} />
        </li>
      )}
    </>
  )
}

/** True while nobody at the shop has worked on any line. */
const isUntouched = ({ lines }: PartRequestRow): boolean =>
  lines.every(({ state }) => state === 'asked' || state === 'cancelled') &&
  lines.some(({ state }) => state === 'asked')

type KeysProps = { request: PartRequestRow; line: Line; busy: boolean; act: Act }

/** One more, one less, cancel: what other phones change of the line is added up with it. */
function LineKeys({ request, line, busy, act }: KeysProps) {
  const { id: requestId, jobId } = request
  const fields = { requestId, lineId: line.id }
  const count = (by: number) =>
    act(
      [{ kind: 'partLine.quantity', jobId, fields: { ...fields, by } }],
      `${line.words}: ${line.quantity + by}.`,
    )
  return (
    <div className="flex flex-wrap gap-2 py-2">
      <Key
        small
        quiet
        disabled={busy || line.quantity <= 1}
        aria-label={`One less: ${line.words}`}
        onClick={() => void count(-1)}
      >
        One less
      </Key>
      <Key
        small
        quiet
        disabled={busy || line.quantity >= 999}
        aria-label={`One more: ${line.words}`}
        onClick={() => void count(1)}
      >
        One more
      </Key>
      <div className="w-full">
        <Hold
          label={`Cancel: ${line.words}`}
          question={`Cancel “${line.words}”? There is no way back.`}
          confirmLabel="Yes, cancel it"
          disabled={busy}
          onConfirm={() =>
            void act([{ kind: 'partLine.cancel', jobId, fields }], `${line.words} is cancelled.`)
          }
        />
      </div>
    </div>
  )
}

/** The whole request, should it have been a mistake; asked twice, as there is no way back to it. */
function TakeBack({ request, busy, act }: { request: PartRequestRow; busy: boolean; act: Act }) {
  const [sure, setSure] = useState(false)
  const { id: requestId, jobId } = request
  if (!sure) {
    return (
      <Key small quiet disabled={busy} onClick={() => setSure(true)}>
        Take the request back
      </Key>
    )
  }
  return (
    <div className="grid gap-2">
      <p className="font-bold">
        Take all {request.lines.length === 1 ? 'of it' : `${request.lines.length} lines`} back?
      </p>
      <div className="flex flex-wrap gap-2">
        <Key
          small
          disabled={busy}
          onClick={() =>
            void act(
              [{ kind: 'partRequest.drop', jobId, requestId, fields: {} }],
              'The request is taken back.',
            )
          }
        >
          Take it back
        </Key>
        <Key small quiet disabled={busy} onClick={() => setSure(false)}>
          Leave it
        </Key>
      </div>
    </div>
  )
}
