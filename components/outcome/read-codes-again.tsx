'use client'
import { living } from '@/lib/diag/case'
import type { Id } from '@/lib/model/id'
import { NotSaved, useSave } from '../checks/use-save'
import type { JobCase } from '../engine/use-case'
import { useStamp } from '../store/use-stamp'
import { Key, KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { READ_AGAIN_WORDS, type ReadAgain } from './codes-cleared'

/** After the proof run the codes are read again (rule R11); the answer follows the entry "codes cleared". */
export function ReadCodesAgain({ jobId, found }: { jobId: Id; found: JobCase }) {
  const cleared = living(found.entries).findLast((entry) => entry.body.kind === 'codesCleared')
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  if (cleared === undefined || cleared.body.kind !== 'codesCleared') return null
  const { readAgain } = cleared.body
  const say = async (next: ReadAgain) => {
    const body = { kind: 'codesCleared', readAgain: next } as const
    await save([stamp.entry(jobId, body, { supersedes: cleared.id })])
  }
  return (
    <section aria-labelledby="again" className="grid gap-2">
      <RuleEdge id="again">Read the codes again</RuleEdge>
      {readAgain === 'notYet' ? (
        <>
          <p>Look at the dash once more: did any code come back?</p>
          <div className="grid grid-cols-2 gap-2">
            <Key quiet disabled={saving} onClick={() => say('noneBack')}>
              {READ_AGAIN_WORDS.noneBack}
            </Key>
            <Key quiet disabled={saving} onClick={() => say('back')}>
              {READ_AGAIN_WORDS.back}
            </Key>
          </div>
          <NotSaved problem={problem} />
        </>
      ) : (
        <p className="font-bold">{READ_AGAIN_WORDS[readAgain]}.</p>
      )}
      {readAgain === 'back' && (
        <KeyLink href={`/field/jobs/${jobId}/codes`}>Record the code that came back</KeyLink>
      )}
    </section>
  )
}
