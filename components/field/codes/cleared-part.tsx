'use client'

import { useState } from 'react'
import { useRecord } from '@/components/store/use-record'
import { useSession } from '@/components/store/use-session'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Choice } from '@/components/ui/choice'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Steps } from '@/components/ui/steps'
import type { SpecSheet } from '@/lib/model/code-book'
import type { LogEntry } from '@/lib/model/log-entry'
import { mayLog } from '@/lib/shop/permissions'

type Props = { jobId: string; entries: readonly LogEntry[]; sheet: SpecSheet | null }

/** Clearing is refused until the codes are recorded or marked unreadable (rule R11); then read again. */
export function ClearedPart({ jobId, entries, sheet }: Props) {
  const session = useSession()
  const roles = session.kind === 'ready' ? session.actor.roles : []
  const recorded = entries.some((e) => e.body.kind === 'code' || e.body.kind === 'codesUnreadable')
  const last = entries.findLast((e) => e.body.kind === 'codesCleared')
  if (!mayLog(roles, 'codesCleared', false)) {
    return null
  }
  return (
    <section className="grid gap-3">
      <RuleEdge>Clearing codes</RuleEdge>
      {recorded && sheet !== null ? (
        <Steps steps={sheet.showCodes.clearSteps.map((text) => ({ text }))} />
      ) : null}
      {recorded ? (
        <ClearKey jobId={jobId} again={last !== undefined} />
      ) : (
        <p className="border-2 border-ink p-3 font-bold">
          Refused until the codes are taken down, or marked as not readable with a reason. What is
          cleared is gone for everybody after you.
        </p>
      )}
      {last === undefined ? null : <ReadAgain jobId={jobId} last={last} />}
    </section>
  )
}

function ClearKey({ jobId, again }: { jobId: string; again: boolean }) {
  const record = useRecord()
  const stamp = useStamp()
  const clear = () => {
    record([stamp.entry(jobId, { kind: 'codesCleared', readAgain: 'notYet' })])
      .then(() => announce('Recorded: codes cleared. Read them again after a start.'))
      .catch(() => announce('Could not be saved. Try again.', 'assertive'))
  }
  return (
    <Hold
      label={again ? 'Codes cleared once more' : 'Codes are cleared'}
      question="Record that the codes were cleared?"
      confirmLabel="Yes, cleared"
      onConfirm={clear}
    />
  )
}

/** After a start the codes are read again; the answer stands in place of "not yet". */
function ReadAgain({ jobId, last }: { jobId: string; last: LogEntry }) {
  const record = useRecord()
  const stamp = useStamp()
  const [answer, setAnswer] = useState<'noneBack' | 'back' | null>(null)
  const [problem, setProblem] = useState<string | null>(null)
  if (last.body.kind !== 'codesCleared') {
    return null
  }
  if (last.body.readAgain !== 'notYet') {
    return (
      <p className="font-bold">
        {last.body.readAgain === 'noneBack'
          ? 'Read again after clearing: none came back.'
          : 'Read again after clearing: they came back. Take them down above.'}
      </p>
    )
  }
  const save = () => {
    if (answer === null) {
      setProblem('Pick what the dash showed.')
      return
    }
    record([
      stamp.entry(jobId, { kind: 'codesCleared', readAgain: answer }, { supersedes: last.id }),
    ])
      .then(() => announce('Saved on this phone.'))
      .catch(() => setProblem('Could not be saved. Try again.'))
  }
  return (
    <div className="grid gap-3">
      <Choice
        legend="Codes were cleared. Start it, run it, read them again."
        value={answer}
        onChange={setAnswer}
        options={[
          { value: 'noneBack', label: 'None came back' },
          { value: 'back', label: 'Codes are back' },
        ]}
        error={problem}
      />
      <Key kind="plate" onClick={save}>
        Save
      </Key>
    </div>
  )
}
