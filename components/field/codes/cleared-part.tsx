'use client'

import { useMayLog } from '@/components/checks/use-may'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Hold } from '@/components/ui/hold'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Steps } from '@/components/ui/steps'
import { living } from '@/lib/diag/case'
import { codesOnRecord } from '@/lib/diag/codes-on-record'
import type { LogEntry } from '@/lib/model/log-entry'
import type { SpecSheet } from '@/lib/model/machine-model'
import { ReadCodesAgain } from './read-codes-again'
import { TakeDownKey } from './take-down-key'

type Props = {
  jobId: string
  entries: readonly LogEntry[]
  sheet: SpecSheet | null
  /** Opens the form where codes are taken down on this very screen. */
  onTakeDown?: () => void
}

/** Clearing is refused until the codes are recorded or marked unreadable (rule R11); then read again. */
export function ClearedPart({ jobId, entries, sheet, onTakeDown }: Props) {
  const takes = onTakeDown ? { onTakeDown } : {}
  const mine = useMayLog('codesCleared')
  const again = living(entries).some((entry) => entry.body.kind === 'codesCleared')
  if (!mine) {
    return null
  }
  return (
    <section className="grid gap-3">
      <RuleEdge>Clear the codes</RuleEdge>
      {codesOnRecord(entries) ? (
        <>
          <ClearSteps sheet={sheet} />
          <ClearKey jobId={jobId} again={again} />
        </>
      ) : (
        <div className="grid gap-2 border-2 border-ink p-3">
          <p className="font-bold">
            Refused until the codes are taken down, or marked as not readable with a reason. What is
            cleared is gone for everybody after you.
          </p>
          <TakeDownKey jobId={jobId} words="Take the codes down" {...takes} />
        </div>
      )}
      <ReadCodesAgain jobId={jobId} entries={entries} {...takes} />
    </section>
  )
}

function ClearSteps({ sheet }: { sheet: SpecSheet | null }) {
  if (sheet === null) {
    return <p>This model has no spec sheet with steps for clearing. Follow the maker’s manual.</p>
  }
  return (
    <>
      <Steps steps={sheet.showCodes.clearSteps.map((text) => ({ text }))} />
      <p className="text-second text-ink2">From: {sheet.showCodes.source}</p>
    </>
  )
}

function ClearKey({ jobId, again }: { jobId: string; again: boolean }) {
  const { save, saving, problem } = useSave()
  const stamp = useStamp()
  const clear = async () => {
    if (await save([stamp.entry(jobId, { kind: 'codesCleared', readAgain: 'notYet' })]))
      announce('Recorded: codes cleared. Read them again after a start.')
  }
  return (
    <>
      <Hold
        label={again ? 'Codes cleared once more' : 'Codes are cleared'}
        question="Record that the codes were cleared?"
        confirmLabel="Yes, cleared"
        disabled={saving}
        onConfirm={clear}
      />
      <NotSaved problem={problem} />
    </>
  )
}
