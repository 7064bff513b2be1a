'use client'
import type { BookIndex } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import { specOf } from '@/lib/diag/spec-of'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { type JobCase, useCase } from '../engine/use-case'
import { useBook } from '../store/use-book'
import { Caution } from '../ui/caution'
import { KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { BookGate } from './book-gate'
import { CheckFacts } from './check-facts'
import { CheckSteps } from './check-steps'
import { ExpectedValues } from './expected-values'
import { MeterBefore } from './meter-before'
import { RecordOutcome } from './record-outcome'
import { SavedOutcome } from './saved-outcome'
import { Separates } from './separates'
import { useJustSaved } from './use-just-saved'
import { WhereItIs } from './where-it-is'

/** One check: what for, with what, how, what to expect, and what was found (F3, rules R8, R24). */
export function CheckScreen({ jobId, checkId }: { jobId: Id; checkId: string }) {
  const { index, version } = useBook()
  const found = useCase(jobId)
  const check = index?.checks.get(checkId) ?? null
  return (
    <BookGate>
      {index === null || found === null ? (
        <Screen title="Check">
          <p role="status">Opening the check.</p>
        </Screen>
      ) : check === null ? (
        <Screen title="Unknown check">
          <p>
            The code book on this phone, version {version}, has no check called “{checkId}”.
          </p>
        </Screen>
      ) : (
        <OneCheck jobId={jobId} check={check} index={index} found={found} />
      )}
    </BookGate>
  )
}

type Props = { jobId: Id; check: CheckItem; index: BookIndex; found: JobCase }

function OneCheck({ jobId, check, index, found }: Props) {
  const { savedId, keepSaved, forget } = useJustSaved(found.entries)
  const judged = specOf(check, found.spec)
  const saved = found.entries.find((entry) => entry.id === savedId)
  if (saved !== undefined)
    return (
      <SavedOutcome jobId={jobId} entry={saved} index={index} check={check} onUndone={forget} />
    )
  const before = living(found.entries).filter(
    (entry) => 'checkId' in entry.body && entry.body.checkId === check.id,
  )
  return (
    <Screen
      title={check.name}
      second={check.purpose}
      foot={
        check.reading !== null && (
          <KeyLink kind="main" href={`/field/jobs/${jobId}/checks/${check.id}/reading`}>
            Take the reading
          </KeyLink>
        )
      }
    >
      <Separates jobId={jobId} check={check} index={index} />
      <CheckFacts check={check} index={index} />
      {check.reading !== null && (
        <MeterBefore jobId={jobId} check={check} index={index} found={found} judged={judged} />
      )}
      <WhereItIs check={check} spec={found.spec} index={index} />
      <section aria-labelledby="steps" className="grid gap-3">
        <RuleEdge id="steps">Steps</RuleEdge>
        {generalCautions(check).map((one) => (
          <Caution key={one.text} signal={one.signal}>
            {one.text}
          </Caution>
        ))}
        <CheckSteps check={check} />
      </section>
      <ExpectedValues check={check} judged={judged} />
      <RecordOutcome
        jobId={jobId}
        check={check}
        index={index}
        before={before}
        onSaved={keepSaved}
      />
    </Screen>
  )
}

/** Those of the whole check; one that belongs to a step stands before that step. */
function generalCautions(check: CheckItem): CheckItem['cautions'] {
  const ofSteps = new Set(check.steps.map((step) => step.caution?.text))
  return check.cautions.filter((caution) => !ofSteps.has(caution.text))
}
