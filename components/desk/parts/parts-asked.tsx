'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import { LogIcon } from '@/components/ui/log-icon'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { DeskJob } from '@/lib/model/desk'
import type { PartLine, PartLineState } from '@/lib/model/part-request'
import { moneyWords } from '@/lib/shop/currency'
import { CHOICE_WORDS, LINE_STATE_WORDS, URGENCY_WORDS } from '@/lib/shop/part-words'
import { may } from '@/lib/shop/permissions'
import type { MoveLineAction } from '../desk-actions'
import { useDesk } from '../desk-context'
import { LineWork } from './line-work'

type Line = PartLine & { state: PartLineState }

/** What the field asked the parts desk for on this job. */
export function PartsAsked({ found, move }: { found: DeskJob; move: MoveLineAction }) {
  const rows = found.parts.flatMap((request) => request.lines.map((line) => ({ request, line })))
  return (
    <section className="mt-7">
      <RuleEdge end={rows.length}>Parts asked for</RuleEdge>
      {rows.length === 0 ? <p className="text-second text-ink2">None.</p> : null}
      <ul>
        {rows.map(({ request, line }) => (
          <li key={line.id} className="border-b-[1.5px] border-rule py-2">
            <PartRow
              line={line}
              urgency={URGENCY_WORDS[request.urgency]}
              requestId={request.id}
              move={move}
            />
          </li>
        ))}
      </ul>
    </section>
  )
}

type RowProps = { line: Line; urgency: string; requestId: string; move: MoveLineAction }

function PartRow({ line, urgency, requestId, move }: RowProps) {
  const { actor } = useDesk()
  const [open, setOpen] = useState(false)
  const mayWork = may(actor.roles, 'part.work')
  return (
    <>
      <div className="flex items-center gap-3">
        <LogIcon shape="hexagon" className="size-8 shrink-0" />
        <div className="min-w-0 flex-1">
          <p
            className={
              line.state === 'cancelled' ? 'text-row font-bold line-through' : 'text-row font-bold'
            }
          >
            {line.words}
          </p>
          <p className="text-second text-ink2">
            {line.quantity} pc, {CHOICE_WORDS[line.choice].toLowerCase()}, {urgency.toLowerCase()}
            {line.position ? `, ${line.position}` : ''}
            {line.number ? <span className="figures block text-ink">{line.number}</span> : null}
            {line.price ? (
              <span className="figures block text-ink">
                {moneyWords(line.price.minor, line.price.currency)}
              </span>
            ) : null}
          </p>
        </div>
        <span className="caps text-section">{LINE_STATE_WORDS[line.state]}</span>
      </div>
      {mayWork ? (
        <div className="mt-2 grid gap-2">
          <Key small={true} quiet={true} aria-expanded={open} onClick={() => setOpen(!open)}>
            {open ? 'Close' : `Work on ${line.words.toLowerCase()}`}
          </Key>
          {open ? <LineWork requestId={requestId} line={line} move={move} /> : null}
        </div>
      ) : null}
    </>
  )
}
