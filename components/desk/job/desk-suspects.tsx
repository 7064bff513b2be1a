'use client'

import { useMemo, useState } from 'react'
import { WhyView } from '@/components/checks/why-view'
import { entryMention } from '@/components/log/entry-words'
import { behindWords } from '@/components/suspects/book-words'
import { NOTICE_WORDS } from '@/components/suspects/notice-words'
import { SuspectRows } from '@/components/suspects/suspect-rows'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { Belief } from '@/lib/diag/belief'
import { symptomsOf } from '@/lib/diag/case'
import { knownSymptoms, opensWayOut } from '@/lib/diag/first-look'
import type { DeskJob } from '@/lib/model/desk'
import { counted } from '../../field/words'
import type { JobCase } from './use-job-case'

/** The suspects as the log leaves them, with the reasons of each on asking. */
export function DeskSuspects({ found, reckoned }: { found: DeskJob; reckoned: JobCase }) {
  const [open, setOpen] = useState<string | null>(null)
  const { index } = reckoned
  const words = useMemo(
    () => new Map(found.entries.map(({ id, body }) => [id, entryMention(body, index)])),
    [found.entries, index],
  )
  const ids = symptomsOf(found)
  const noFault = index !== null && opensWayOut(knownSymptoms(index, ids))
  const belief = ids.length === 0 || noFault ? undefined : reckoned.answer?.belief
  return (
    <section className="mt-7" aria-busy={reckoned.working}>
      <RuleEdge end="of 100">
        {found.entries.length === 0
          ? 'Suspects from the complaint'
          : `Suspects after ${counted(found.entries.length, 'entry', 'entries')}`}
      </RuleEdge>
      <p className="text-second text-ink2">More than one can be true. {asOf(reckoned)}</p>
      {reckoned.failed ? (
        <p className="font-bold text-nogo">
          The suspects could not be worked out here. The job log below is whole.
        </p>
      ) : null}
      {ids.length > 0 ? null : (
        <p className="mt-1 font-bold">
          Nobody has said yet what it does, so there is nothing to rank suspects by.
        </p>
      )}
      {noFault ? (
        <p className="mt-1 font-bold">No fault to look for: what is wanted is a way out.</p>
      ) : null}
      {belief ? (
        <>
          <Notices notices={belief.notices} />
          <div className="mt-2">
            <SuspectRows
              suspects={belief.suspects}
              entryWords={(id) => words.get(id) ?? 'an entry of the log'}
              open={open}
              onOpen={setOpen}
              why={(suspect) =>
                index && (
                  <WhyView
                    suspect={suspect}
                    entries={found.entries}
                    index={index}
                    zone={found.shop.zone}
                  />
                )
              }
            />
          </div>
        </>
      ) : null}
    </section>
  )
}

function asOf({ index, newerSeen, working }: JobCase): string {
  if (!index) return 'Reading the code book.'
  const book =
    newerSeen === null
      ? `Worked out here with code book version ${index.version}.`
      : behindWords(index.version, newerSeen)
  return `${book}${working ? ' Working.' : ''}`
}

function Notices({ notices }: { notices: Belief['notices'] }) {
  return notices.map((notice) => (
    <p key={notice} className="mt-1 font-bold">
      {NOTICE_WORDS[notice]}
    </p>
  ))
}
