'use client'
import { type ReactNode, useState } from 'react'
import type { Suspect } from '@/lib/diag/belief'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import type { Outcome } from '@/lib/diag/outlook'
import { of100 } from '../reading-strip/figures'
import { Key } from '../ui/key'
import { ChanceRail } from './chance-rail'
import { MarkPicture } from './mark-sign'
import { type Mark, marksOf, saysNothing } from './outlook-words'
import { useSlide } from './use-slide'

type Props = {
  /** Sorted, ruled out last, "something else" always in: as the engine gives them. */
  suspects: readonly Suspect[]
  /** Outcomes of the check that is up; empty when none is. */
  outlook?: readonly Outcome[]
  /** What ruled a suspect out, in words, by the entry's id. */
  entryWords?: (entryId: string) => string
  /** The suspect whose "why" is open, and what to show there. */
  open?: string | null
  onOpen?: (fault: string | null) => void
  why?: (suspect: Suspect) => ReactNode
}

/** The suspects in order: name, chance of 100, rail with the marks of the check that is up, and its words. */
export function SuspectRows(props: Props) {
  const { suspects, outlook = [] } = props
  const [all, setAll] = useState(false)
  const ranked = suspects.map((suspect, i) => ({ suspect, rank: i + 1 }))
  const shown = all ? ranked : ranked.filter((row) => standsOut(row, ranked, props))
  const folded = ranked.length - shown.length
  const list = useSlide<HTMLOListElement>(shown.map(({ suspect }) => suspect.fault).join(' '))
  return (
    <>
      <ol ref={list} className="grid gap-3">
        {shown.map(({ suspect, rank }) => (
          <li key={suspect.fault} data-row={suspect.fault} className="min-w-0">
            {suspect.ruledOutBy === null ? (
              <Standing {...props} suspect={suspect} rank={rank} outlook={outlook} />
            ) : (
              <RuledOut
                {...props}
                suspect={suspect}
                by={props.entryWords?.(suspect.ruledOutBy) ?? null}
              />
            )}
          </li>
        ))}
      </ol>
      {(folded > 0 || all) && (
        <Key small quiet className="w-full" aria-expanded={all} onClick={() => setAll(!all)}>
          {all ? 'Only the likely ones' : foldWords(ranked, shown)}
        </Key>
      )}
    </>
  )
}

type Ranked = { suspect: Suspect; rank: number }

/** So many of those ruled out have a row: one clean proof run rules out all the others at once. */
const MOST_RULED_OUT = 4

/** A row each for the first five, all from 3 of 100 up, "something else", some ruled-out and the open one. */
function standsOut(row: Ranked, ranked: readonly Ranked[], { open }: Props): boolean {
  const { suspect, rank } = row
  if (suspect.fault === SOMETHING_ELSE || suspect.fault === open) return true
  if (suspect.ruledOutBy === null) return rank <= 5 || suspect.chance >= 0.03
  const firstOut = ranked.findIndex((one) => one.suspect.ruledOutBy !== null)
  return rank - firstOut <= MOST_RULED_OUT
}

/** `33 more, each 2 of 100 or less`. */
function foldWords(ranked: readonly Ranked[], shown: readonly Ranked[]): string {
  const seen = new Set(shown.map(({ suspect }) => suspect.fault))
  const hidden = ranked.filter(({ suspect }) => !seen.has(suspect.fault))
  const most = Math.max(...hidden.map(({ suspect }) => suspect.chance))
  return `${hidden.length} more, each ${Math.max(1, Math.ceil(most * 100))} of 100 or less`
}

type One = Props & { suspect: Suspect }

function Standing(props: One & { rank: number; outlook: readonly Outcome[] }) {
  const { suspect, rank } = props
  const marks = marksOf(suspect.fault, props.outlook)
  const silent = saysNothing(marks)
  return (
    <>
      <Head {...props} lead={<span className="caps w-7 shrink-0 text-key">{rank}</span>}>
        <span className="min-w-0 flex-1 text-row font-bold">{suspect.name}</span>
        <span className="figures shrink-0 text-key">{of100(suspect.chance)}</span>
      </Head>
      <ChanceRail chance={suspect.chance} marks={silent ? [] : marks} />
      <MarkWords marks={marks} silent={silent} />
      {props.open === suspect.fault && props.why?.(suspect)}
    </>
  )
}

function MarkWords({ marks, silent }: { marks: readonly Mark[]; silent: boolean }) {
  if (marks.length === 0) return null
  if (silent) return <p className="mt-1 text-second text-ink2">this check says nothing about it</p>
  return (
    <p className="mt-1 flex flex-wrap gap-x-5 gap-y-0.5 text-second text-ink2">
      {marks.map((mark) => (
        <span key={mark.outcome} className="inline-flex items-center gap-1.5">
          <MarkPicture shape={mark.shape} />
          {mark.words}{' '}
          <span className="figures whitespace-nowrap text-ink">{of100(mark.chance)}</span>
        </span>
      ))}
    </p>
  )
}

function RuledOut(props: One & { by: string | null }) {
  const { suspect, by } = props
  return (
    <>
      <Head {...props} lead={<span className="w-7 shrink-0" />}>
        <span className="min-w-0 flex-1">
          <s className="text-row font-bold">{suspect.name}</s>
          <span className="block text-second text-ink2">
            ruled out{by === null ? '' : ` by ${by}`}
          </span>
        </span>
        <span className="figures shrink-0 text-body text-ink2">{of100(suspect.chance)}</span>
      </Head>
      {props.open === suspect.fault && props.why?.(suspect)}
    </>
  )
}

/** The row's first line; a key that opens the reasons where there are any to show. */
function Head(props: One & { lead: ReactNode; children: ReactNode }) {
  const { suspect, open, onOpen, why } = props
  if (why === undefined || onOpen === undefined) {
    return (
      <div className="flex min-h-9 items-end gap-1">
        {props.lead}
        {props.children}
      </div>
    )
  }
  const isOpen = open === suspect.fault
  return (
    <button
      type="button"
      aria-expanded={isOpen}
      onClick={() => onOpen(isOpen ? null : suspect.fault)}
      className="flex min-h-target w-full items-end gap-1 pb-0.5 text-left"
    >
      {props.lead}
      {props.children}
      <span className="w-14 shrink-0 text-right text-second font-bold underline underline-offset-3">
        {isOpen ? 'close' : 'why'}
      </span>
    </button>
  )
}
