'use client'
import { useState } from 'react'
import { wordName } from '@/lib/diag/book-index'
import type { Id } from '@/lib/model/id'
import { useBelief } from '../engine/use-belief'
import { useCase } from '../engine/use-case'
import { of100 } from '../reading-strip/figures'
import { useBook } from '../store/use-book'
import { usePartRequests } from '../store/use-rows'
import { Key } from '../ui/key'
import { Row } from '../ui/row'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { AskedRequest } from './asked-request'

/** PARTS: what was asked for and where it stands, and what may be asked for, from the suspects. */
export function PartsScreen({ jobId }: { jobId: Id }) {
  const requests = usePartRequests(jobId)
  const found = useCase(jobId)
  return (
    <Screen title="Parts" second="What the shop is asked for, and where each line stands.">
      <section aria-labelledby="asked" className="grid gap-1">
        <RuleEdge id="asked" end={requests === undefined ? null : String(requests.length)}>
          Asked for
        </RuleEdge>
        {requests?.length === 0 && <p>Nothing yet.</p>}
        <ul>
          {requests?.map((request) => (
            <AskedRequest key={request.id} request={request} zone={found?.job.zone ?? 'UTC'} />
          ))}
        </ul>
      </section>
      <FromSuspects jobId={jobId} />
    </Screen>
  )
}

/** One tap on a suspect, one on ASK. */
function FromSuspects({ jobId }: { jobId: Id }) {
  const { index } = useBook()
  const { answer } = useBelief(jobId)
  const [all, setAll] = useState(false)
  if (index === null || answer === null) return null
  const rows = answer.belief.suspects.flatMap((suspect) => {
    const part = index.faults.get(suspect.fault)?.repair?.part ?? null
    return part === null || suspect.ruledOutBy !== null ? [] : [{ suspect, part }]
  })
  const shown = all ? rows : rows.filter(({ suspect }, i) => i < 3 || suspect.chance >= 0.03)
  return (
    <section aria-labelledby="ask-for" className="grid gap-1">
      <RuleEdge id="ask-for">Ask for a part</RuleEdge>
      <p className="text-second text-ink2">By suspect, with its chance of 100.</p>
      {rows.length === 0 && <p>No suspect needs a part.</p>}
      <ul>
        {shown.map(({ suspect, part }) => (
          <li key={suspect.fault}>
            <Row
              title={wordName(index, 'part', part)}
              second={suspect.name}
              end={of100(suspect.chance)}
              href={`/field/jobs/${jobId}/parts/ask?part=${encodeURIComponent(part)}&fault=${encodeURIComponent(suspect.fault)}`}
            />
          </li>
        ))}
      </ul>
      {shown.length < rows.length && (
        <Key small className="mt-2" onClick={() => setAll(true)}>
          Parts of all suspects
        </Key>
      )}
    </section>
  )
}
