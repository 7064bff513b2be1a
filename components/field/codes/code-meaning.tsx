'use client'

import { contextWords } from '@/components/log/code-sentences'
import { useBook } from '@/components/store/use-book'
import { Plate } from '@/components/ui/plate'
import { RuleEdge } from '@/components/ui/rule-edge'
import { explainCode, type FaultRef } from '@/lib/diag/code-words'
import type { CodeContext, CodeSeen } from '@/lib/model/code-seen'
import type { Features } from '@/lib/model/features'
import { sentence } from '../words'

type Props = { seen: CodeSeen; context: CodeContext; features: Features }

/** What a code says in plain words, and what it does not. */
export function CodeMeaning({ seen, context, features }: Props) {
  const { index } = useBook()
  if (index === null) {
    return <p>The code book is not on this phone yet. The code stays as entered.</p>
  }
  const words = explainCode(index, seen, features)
  return (
    <section className="grid gap-4">
      <Plate>
        <p className="text-second text-scribe2">{contextWords(context)}</p>
        <h2 data-meaning="" tabIndex={-1} className="caps text-plate">
          {words.title}
        </h2>
        <p className="pt-1 text-row font-bold">{sentence(words.circuitName)}</p>
        {words.failure === null ? null : <p className="text-row">{sentence(words.failure.name)}</p>}
      </Plate>
      <p className="text-row font-bold">{words.doesNotProve}</p>
      {words.makersDiffer ? (
        <p className="font-bold">This maker may differ: the maker’s manual decides.</p>
      ) : null}
      {words.formWords === null ? null : <p>{words.formWords}</p>}
      {words.failure === null ? null : (
        <>
          <RuleEdge level={3}>{kindTitle(seen)}</RuleEdge>
          {words.firstThought === null ? null : <p>{words.firstThought}</p>}
          {words.supportsWords === null ? null : <p>{words.supportsWords}</p>}
          {words.arguesAgainstWords === null ? null : <p>{words.arguesAgainstWords}</p>}
          {words.kindDoesNotProve === null ? null : (
            <p className="font-bold">{words.kindDoesNotProve}</p>
          )}
        </>
      )}
      <Faults title="It supports" sign="for" faults={words.kindSupports} />
      <Faults title="It argues against" sign="against" faults={words.kindArguesAgainst} />
      <p className="text-second text-ink2">From: {words.source}</p>
    </section>
  )
}

const kindTitle = (seen: CodeSeen): string =>
  seen.format === 'spn' ? 'The third number is the failure kind' : 'The failure kind'

function Faults(props: { title: string; sign: 'for' | 'against'; faults: readonly FaultRef[] }) {
  if (props.faults.length === 0) {
    return null
  }
  return (
    <div>
      <h3 className="font-bold">{props.title}</h3>
      <ul>
        {props.faults.map((fault) => (
          <li
            key={fault.fault}
            className="flex min-h-12 flex-wrap items-center gap-x-3 border-b-[1.5px] border-rule py-1"
          >
            <Sign sign={props.sign} />
            <span className="min-w-36 flex-1">{fault.name}</span>
            {fault.of100 === null ? null : (
              <span className="text-second text-ink2">
                sets it in <span className="figures">{Math.round(fault.of100)}</span> of 100
              </span>
            )}
          </li>
        ))}
      </ul>
    </div>
  )
}

/** A ring for, a cross against: the same marks as on the suspects. */
function Sign({ sign }: { sign: 'for' | 'against' }) {
  return (
    <svg viewBox="0 0 20 20" className="size-5 shrink-0" fill="none" aria-hidden="true">
      {sign === 'for' ? (
        <circle cx="10" cy="10" r="7" stroke="var(--go)" strokeWidth="3.4" />
      ) : (
        <path d="M3 3 17 17M17 3 3 17" stroke="var(--nogo)" strokeWidth="3.8" />
      )}
    </svg>
  )
}
