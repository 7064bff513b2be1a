'use client'

import { NotSaved, useSave } from '@/components/checks/use-save'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { living } from '@/lib/diag/case'
import type { LogEntry } from '@/lib/model/log-entry'
import { TakeDownKey } from './take-down-key'

type Props = {
  jobId: string
  entries: readonly LogEntry[]
  /** Opens the form where codes are taken down on this very screen; elsewhere a link leads there. */
  onTakeDown?: () => void
}

/** After clearing and a start the codes are read again; the answer stands in place of "not yet" (rule R11). */
export function ReadCodesAgain({ jobId, entries, onTakeDown }: Props) {
  const cleared = living(entries).findLast((entry) => entry.body.kind === 'codesCleared')
  const { save, saving, problem } = useSave()
  const stamp = useStamp()
  if (cleared === undefined || cleared.body.kind !== 'codesCleared') {
    return null
  }
  const { readAgain } = cleared.body
  const say = async (next: 'noneBack' | 'back') => {
    const body = { kind: 'codesCleared', readAgain: next } as const
    if (await save([stamp.entry(jobId, body, { supersedes: cleared.id })]))
      announce('Saved on this phone.')
  }
  return (
    <section aria-labelledby="again" className="grid gap-2">
      <RuleEdge id="again" level={3}>
        Read the codes again
      </RuleEdge>
      {readAgain === 'notYet' ? (
        <>
          <p>
            Codes are recorded as cleared. Start it, run it, look at the dash: did one come back?
          </p>
          <div className="grid grid-cols-2 gap-2">
            <Key disabled={saving} onClick={() => say('noneBack')}>
              None back
            </Key>
            <Key disabled={saving} onClick={() => say('back')}>
              Codes back
            </Key>
          </div>
          <NotSaved problem={problem} />
        </>
      ) : (
        <p className="font-bold">
          {readAgain === 'noneBack'
            ? 'Read again after clearing: none came back.'
            : 'Read again after clearing: they came back.'}
        </p>
      )}
      {readAgain === 'back' ? (
        <TakeDownKey
          jobId={jobId}
          words="Take down what came back"
          {...(onTakeDown ? { onTakeDown } : {})}
        />
      ) : null}
    </section>
  )
}
