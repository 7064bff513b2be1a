'use client'

import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { BookVersionRow } from '@/lib/model/book-desk'
import { readSentence } from '../desk-sentences'
import type { BookActions } from './book-actions'
import { findingLine } from './book-words'
import { ImportPart } from './import-part'
import { Lines } from './lines'
import { useBookActing, useBooks } from './use-books'
import { VersionPart } from './version-part'
import { WithdrawForm } from './withdraw-form'
import { WithdrawalPart } from './withdrawal-part'

/** The shop's code book: the draft, the versions, what was withdrawn, and files in and out. */
export function BookDesk({ actions }: { actions: BookActions }) {
  const read = useBooks()
  const { versions = [], withdrawals = [], people = [] } = read.data ?? {}
  const draft = versions.find(({ state }) => state === 'draft')
  const published = versions.filter(({ state }) => state !== 'draft')
  return (
    <main id="desk-main" tabIndex={-1} className="desk-page grid max-w-280 gap-4">
      <div className="flex flex-wrap items-end justify-between gap-4">
        <h1 className="caps text-figure">Code book</h1>
        <span className="figures text-figure">{published[0]?.version ?? ''}</span>
      </div>
      <p>
        Phones take in a new version by themselves. A job keeps the version it began with until
        somebody moves it. What is withdrawn for safety is offered on no job any more.
      </p>
      {read.error ? <p className="font-bold text-nogo">{readSentence(read.error)}</p> : null}
      {read.isPending ? <p>Reading the code book.</p> : null}
      {draft === undefined ? null : <DraftPart row={draft} actions={actions} />}
      <ImportPart hasDraft={draft !== undefined} />
      <section className="grid gap-3">
        <RuleEdge end={String(withdrawals.length)}>Withdrawn for safety</RuleEdge>
        <ul>
          {withdrawals.toReversed().map((one) => (
            <WithdrawalPart key={one.id} one={one} people={people} />
          ))}
        </ul>
        <WithdrawForm withdraw={actions.withdraw} versions={published} />
      </section>
      {published.map((row) => (
        <VersionPart key={row.version} row={row} />
      ))}
    </main>
  )
}

function DraftPart({ row, actions }: { row: BookVersionRow; actions: BookActions }) {
  const { busy, refusal, findings, act } = useBookActing()
  return (
    <VersionPart row={row}>
      {refusal ? (
        <p role="alert" className="font-bold text-nogo">
          {refusal}
        </p>
      ) : null}
      <Lines title="Findings" lines={findings.map(findingLine)} />
      <div className="grid max-w-160 gap-3">
        <Key
          kind="plate"
          disabled={busy}
          onClick={() => {
            act(
              () => actions.publish({}),
              ({ version }) => `Version ${version} is published.`,
            ).catch(() => undefined)
          }}
        >
          Publish the draft
        </Key>
        <Hold
          label="Drop the draft"
          question="Drop the draft? It is nowhere else unless it is in a file."
          confirmLabel="Drop it"
          disabled={busy}
          onConfirm={() => {
            act(
              () => actions.drop({}),
              () => 'The draft is dropped.',
            ).catch(() => undefined)
          }}
        />
      </div>
    </VersionPart>
  )
}
