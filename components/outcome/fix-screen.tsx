'use client'
import { useState } from 'react'
import { living } from '@/lib/diag/case'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'
import { UndoBar } from '../checks/undo-bar'
import { useJustSaved } from '../checks/use-just-saved'
import { NotYours, useMayLog } from '../checks/use-may'
import { useCase } from '../engine/use-case'
import { ClearedPart } from '../field/codes/cleared-part'
import { useNow } from '../field/use-now'
import { whenWords } from '../field/when-words'
import { useBook } from '../store/use-book'
import { useJobZone } from '../store/use-job-zone'
import { Key, KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { FixForm } from './fix-form'

/** What was mended, temporary or for good; then the codes, then the proof run. */
export function FixScreen({ jobId }: { jobId: Id }) {
  const found = useCase(jobId)
  const { savedId, keepSaved, forget } = useJustSaved(found?.entries ?? [])
  const [another, setAnother] = useState(false)
  const mine = useMayLog('fix')
  if (found === null)
    return (
      <Screen title="Fix">
        <p role="status">Opening the job.</p>
      </Screen>
    )
  const fixes = living(found.entries).filter((entry) => entry.body.kind === 'fix')
  const saved = (id: Id) => {
    keepSaved(id)
    setAnother(false)
  }
  if (!mine)
    return (
      <Screen title="Fix">
        <Fixes jobId={jobId} fixes={fixes} />
        <NotYours what="Recording a fix" />
      </Screen>
    )
  if (fixes.length === 0 || another)
    return (
      <FixForm jobId={jobId} onSaved={saved}>
        <Fixes jobId={jobId} fixes={fixes} />
      </FixForm>
    )
  return (
    <Screen
      title="Fix"
      second="On record. Next: the codes, then the proof run."
      foot={
        <KeyLink kind="main" href={`/field/jobs/${jobId}/proof`}>
          To the proof run
        </KeyLink>
      }
    >
      {savedId !== null && (
        <UndoBar
          key={savedId}
          jobId={jobId}
          entryId={savedId}
          what="Fix recorded"
          onUndone={forget}
        />
      )}
      <Fixes jobId={jobId} fixes={fixes} />
      <ClearedPart jobId={jobId} entries={found.entries} sheet={found.spec} />
      <Key small onClick={() => setAnother(true)}>
        Record another fix
      </Key>
    </Screen>
  )
}

/** The fixes on record, temporary ones with their limit and how to undo them. */
function Fixes({ jobId, fixes }: { jobId: Id; fixes: readonly LogEntry[] }) {
  const { index } = useBook()
  const zone = useJobZone(jobId)
  const now = useNow()
  if (fixes.length === 0) return null
  return (
    <section aria-labelledby="fixes" className="grid gap-2">
      <RuleEdge id="fixes">Recorded</RuleEdge>
      <ul>
        {fixes.map(({ id, body, happenedAt }) =>
          body.kind === 'fix' ? (
            <li key={id} className="flex gap-3 border-b-[1.5px] border-rule py-2">
              <span className="figures text-ink2">{whenWords(happenedAt, zone, now)}</span>
              <span className="min-w-0">
                <b className="block">{index?.faults.get(body.fault)?.name ?? body.fault}</b>
                {body.words}
                {body.temporary !== null && (
                  <span className="block font-bold">
                    Temporary. Limit: {body.temporary.limit}. To undo: {body.temporary.undo}
                  </span>
                )}
              </span>
            </li>
          ) : null,
        )}
      </ul>
    </section>
  )
}
