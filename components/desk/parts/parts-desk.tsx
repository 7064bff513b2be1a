'use client'

import { useEffect, useRef, useState } from 'react'
import { announce } from '@/components/ui/announce'
import { ChoiceMany } from '@/components/ui/choice'
import type { DeskParts } from '@/lib/model/desk'
import type { PartLineState } from '@/lib/model/part-request'
import { counted } from '../../field/words'
import type { MoveLineAction } from '../desk-actions'
import { readSentence } from '../desk-sentences'
import { useDeskParts } from '../use-desk-reads'
import { PartsTable } from './parts-table'

const DONE: readonly PartLineState[] = ['fitted', 'returned', 'credited', 'cancelled']

/** The parts desk: what was asked for and how far each line is. */
export function PartsDesk({ move }: { move: MoveLineAction }) {
  const parts = useDeskParts()
  const [showDone, setShowDone] = useState(false)
  usePartsNews(parts.data)
  const all = parts.data?.lines ?? []
  const open = all.filter(({ line }) => !DONE.includes(line.state))
  const rows = showDone ? all : open
  return (
    <main id="desk-main" tabIndex={-1} className="desk-page">
      <div className="flex flex-wrap items-end justify-between gap-4">
        <h1 className="caps text-figure">Parts asked for</h1>
        <span className="figures text-figure">{parts.data ? open.length : ''}</span>
      </div>
      {parts.error ? <p className="my-3 font-bold text-nogo">{readSentence(parts.error)}</p> : null}
      {parts.isPending ? <p className="my-3">Reading the parts asked for.</p> : null}
      {parts.data && all.length > open.length ? (
        <div className="my-3 max-w-96">
          <ChoiceMany
            legend="Show"
            legendHidden={true}
            options={[
              { value: 'done', label: `Done and cancelled too, ${all.length - open.length}` },
            ]}
            value={showDone ? ['done'] : []}
            onChange={(next) => setShowDone(next.length > 0)}
          />
        </div>
      ) : null}
      {parts.data && rows.length === 0 ? <p className="my-3">Nothing is asked for.</p> : null}
      {rows.length > 0 ? <PartsTable rows={rows} move={move} /> : null}
    </main>
  )
}

/** Says new lines to people who do not see the table grow. */
function usePartsNews(parts: DeskParts | undefined) {
  const before = useRef<DeskParts | undefined>(undefined)
  useEffect(() => {
    if (before.current && parts) {
      const known = new Set(before.current.lines.map(({ line }) => line.id))
      const fresh = parts.lines.filter(({ line }) => !known.has(line.id))
      if (fresh.length > 0) {
        const names = fresh.map(({ line }) => line.words).join(', ')
        announce(`${counted(fresh.length, 'new part line')}: ${names}.`)
      }
    }
    before.current = parts
  }, [parts])
}
