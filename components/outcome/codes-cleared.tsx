'use client'
import { useState } from 'react'
import { living } from '@/lib/diag/case'
import type { Id } from '@/lib/model/id'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { NotSaved, useSave } from '../checks/use-save'
import type { JobCase } from '../engine/use-case'
import { clockTime } from '../field/times'
import { useStamp } from '../store/use-stamp'
import { Choice } from '../ui/choice'
import { Hold } from '../ui/hold'
import { KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Steps } from '../ui/steps'

export type ReadAgain = Extract<LogBody, { kind: 'codesCleared' }>['readAgain']

export const READ_AGAIN_WORDS: Record<ReadAgain, string> = {
  noneBack: 'None came back',
  back: 'A code came back',
  notYet: 'Not read again yet',
}

/** True when every code was taken down, or it was said why not: only then may they be cleared (rule R11). */
export const codesOnRecord = (entries: readonly LogEntry[]): boolean =>
  living(entries).some(({ body }) => body.kind === 'code' || body.kind === 'codesUnreadable')

/** Clearing the codes: refused before they are on record, then with the model's own steps. */
export function CodesCleared({ jobId, found }: { jobId: Id; found: JobCase }) {
  const cleared = living(found.entries).filter((entry) => entry.body.kind === 'codesCleared')
  const [readAgain, setReadAgain] = useState<ReadAgain | null>(null)
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const keep = () => {
    if (readAgain === null) return
    save([stamp.entry(jobId, { kind: 'codesCleared', readAgain })]).then(
      (saved) => saved && setReadAgain(null),
      () => undefined,
    )
  }
  return (
    <section aria-labelledby="clear" className="grid gap-3">
      <RuleEdge id="clear">Clear the codes</RuleEdge>
      {cleared.map(({ id, body, happenedAt, zone }) =>
        body.kind === 'codesCleared' ? (
          <p key={id} className="font-bold">
            <span className="figures mr-2 text-ink2">{clockTime(happenedAt, zone)}</span>
            Codes cleared. {READ_AGAIN_WORDS[body.readAgain]}.
          </p>
        ) : null,
      )}
      {!codesOnRecord(found.entries) ? (
        <NotYet jobId={jobId} />
      ) : cleared.length > 0 ? null : (
        <>
          <ClearSteps found={found} />
          <Choice
            legend="Read again after clearing"
            value={readAgain}
            onChange={setReadAgain}
            options={[
              { value: 'noneBack', label: READ_AGAIN_WORDS.noneBack },
              { value: 'back', label: READ_AGAIN_WORDS.back },
              { value: 'notYet', label: READ_AGAIN_WORDS.notYet },
            ]}
          />
          <NotSaved problem={problem} />
          <Hold
            label="Codes cleared"
            question="Are the codes cleared on the machine?"
            confirmLabel="Cleared"
            disabled={saving || readAgain === null}
            onConfirm={keep}
          />
        </>
      )}
    </section>
  )
}

function NotYet({ jobId }: { jobId: Id }) {
  return (
    <div className="grid gap-2">
      <p className="font-bold">
        Refused: no code is on record. Once cleared or with the battery off they are gone.
      </p>
      <KeyLink href={`/field/jobs/${jobId}/codes`}>Record the codes</KeyLink>
      <p className="text-second text-ink2">
        If they cannot be read, say so there with the reason. No lamp and no codes: record that.
      </p>
    </div>
  )
}

function ClearSteps({ found }: { found: JobCase }) {
  const show = found.spec?.showCodes
  if (show === undefined)
    return (
      <p>This model has no spec sheet with steps for clearing. Follow the maker&apos;s manual.</p>
    )
  return (
    <>
      <Steps steps={show.clearSteps.map((text) => ({ text }))} />
      <p className="text-second text-ink2">Spec sheet: {show.source}.</p>
    </>
  )
}
