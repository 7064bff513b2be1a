'use client'

import { Fragment, useState } from 'react'
import { Key } from '@/components/ui/key'
import type { DeskPartLine } from '@/lib/model/desk'
import { moneyWords } from '@/lib/shop/currency'
import { CHOICE_WORDS, LINE_STATE_WORDS, URGENCY_WORDS } from '@/lib/shop/part-words'
import { may } from '@/lib/shop/permissions'
import { span } from '../../field/times'
import type { MoveLineAction } from '../desk-actions'
import { useDesk } from '../desk-context'
import { deskPaths } from '../desk-path'
import { useNow } from '../use-now'
import { adviceWords } from './advice-words'
import { LineWork } from './line-work'

type Props = { rows: readonly DeskPartLine[]; move: MoveLineAction }

const COLUMNS = ['Job', 'Part', 'Pieces', 'Choice and price', 'Wanted', 'Asked', 'State']

/** Every part line as a row; the keys open under it for those who work on parts. */
export function PartsTable({ rows, move }: Props) {
  const { actor } = useDesk()
  const [open, setOpen] = useState<string | null>(null)
  const mayWork = may(actor.roles, 'part.work')
  const columns = mayWork ? [...COLUMNS, 'Keys'] : COLUMNS
  return (
    <table className="desk-table">
      <caption className="visually-hidden">Parts the field asked for, newest first</caption>
      <thead>
        <tr>
          {columns.map((name) => (
            <th key={name} scope="col">
              {name}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => {
          const { line, request } = row
          const isOpen = open === line.id
          return (
            <Fragment key={line.id}>
              <tr className={line.state === 'cancelled' ? 'desk-table-off' : undefined}>
                <Cells row={row} />
                {mayWork ? (
                  <td data-name="Keys">
                    <Key
                      small={true}
                      quiet={true}
                      className="desk-key whitespace-nowrap"
                      aria-expanded={isOpen}
                      onClick={() => setOpen(isOpen ? null : line.id)}
                    >
                      {isOpen ? 'Close' : 'Work on it'}
                      <span className="visually-hidden"> {line.words}</span>
                    </Key>
                  </td>
                ) : null}
              </tr>
              {mayWork && isOpen ? (
                <tr className="desk-table-work">
                  <td colSpan={columns.length}>
                    <LineWork requestId={request.id} line={line} move={move} />
                  </td>
                </tr>
              ) : null}
            </Fragment>
          )
        })}
      </tbody>
    </table>
  )
}

function Cells({ row }: { row: DeskPartLine }) {
  const now = useNow()
  const { line, request } = row
  return (
    <>
      <th scope="row" data-name="Job">
        <a href={deskPaths.job(request.jobId)} className="figures">
          {row.jobNumber}
        </a>
        <span className="block text-second font-bold">{row.complaint}</span>
        <span className="block text-second text-ink2">{row.machineWords}</span>
      </th>
      <td data-name="Part">
        <strong className="text-row">{line.words}</strong>
        {line.position ? (
          <span className="block text-second text-ink2">{line.position}</span>
        ) : null}
        {line.number ? <span className="figures block text-second">{line.number}</span> : null}
        {request.note ? <span className="block text-second text-ink2">{request.note}</span> : null}
      </td>
      <td data-name="Pieces" className="figures">
        {line.quantity}
      </td>
      <td data-name="Choice and price">
        <ChoiceCell row={row} />
      </td>
      <td data-name="Wanted">
        <strong className={request.urgency === 'now' ? 'text-nogo' : undefined}>
          {URGENCY_WORDS[request.urgency]}
        </strong>
      </td>
      <td data-name="Asked">
        {now === null ? '' : `${span(now - Date.parse(request.askedAt))} ago`}
        <span className="block text-second text-ink2">by {row.askedBy ?? 'name erased'}</span>
      </td>
      <td data-name="State" className="caps text-section">
        {LINE_STATE_WORDS[line.state]}
      </td>
    </>
  )
}

function ChoiceCell({ row: { line, request } }: { row: DeskPartLine }) {
  const { shop } = useDesk()
  const advice = request.advice ? adviceWords(request.advice, shop.currency) : null
  return (
    <>
      <strong>{CHOICE_WORDS[line.choice]}</strong>
      {line.price ? (
        <span className="figures block">{moneyWords(line.price.minor, line.price.currency)}</span>
      ) : null}
      {advice ? (
        <span className="block text-second text-ink2">
          <span className="block text-ink">{advice.first}</span>
          {advice.from}
        </span>
      ) : null}
    </>
  )
}
