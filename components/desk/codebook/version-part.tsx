'use client'

import { RuleEdge } from '@/components/ui/rule-edge'
import type { BookVersionRow } from '@/lib/model/book-desk'
import { whenWords } from '../../field/when-words'
import { useDesk } from '../desk-context'
import { useNow } from '../use-now'
import { countWords, sinceLines } from './book-words'

type Row = { row: BookVersionRow; children?: React.ReactNode }

/** One version, or the draft: what is in it, who made it, what changed, and its files. */
export function VersionPart({ row, children }: Row) {
  const { shop } = useDesk()
  const now = useNow()
  const title = row.version === null ? 'Draft' : `Version ${row.version}`
  const by = (who: BookVersionRow['madeBy'], other: string) =>
    who === null ? other : (who.name ?? 'Name erased')
  const lines: [string, string[]][] = [
    ['In it', [countWords(row.counts)]],
    [row.version === null ? 'Taken in' : 'Published', [whenWords(row.at, shop.zone, now)]],
    ['Made by', [by(row.madeBy, 'came with the program')]],
    ...(row.publishedBy === null
      ? []
      : [['Published by', [by(row.publishedBy, '')]] as [string, string[]]]),
    ...(row.note === null ? [] : [['Note', [row.note]] as [string, string[]]]),
    ...(row.since === null ? [] : [['Changes', sinceLines(row.since)] as [string, string[]]]),
    ['Figures from', row.sources],
    ['Mark', [row.hash.slice(0, 16)]],
  ]
  const which = row.version === null ? 'draft' : String(row.version)
  return (
    <section aria-label={title} className="grid gap-3 pb-4">
      <RuleEdge end={row.state}>{title}</RuleEdge>
      <dl className="grid gap-x-6 gap-y-2 min-[760px]:grid-cols-[minmax(11rem,auto)_1fr]">
        {lines.map(([name, words]) => (
          <div key={name} className="min-[760px]:contents">
            <dt className="text-ink2">{name}</dt>
            <dd className="min-w-0 font-bold break-words">
              {words.map((line) => (
                <span key={line} className="block">
                  {line}
                </span>
              ))}
            </dd>
          </div>
        ))}
      </dl>
      <Files which={which} kinds={Object.keys(row.counts)} title={title} />
      {children}
    </section>
  )
}

function Files({ which, kinds, title }: { which: string; kinds: string[]; title: string }) {
  const at = `/api/desk/codebook/export?version=${which}`
  return (
    <details>
      <summary className="cursor-pointer font-bold">Files of {title.toLowerCase()}</summary>
      <p className="pt-2">
        <a href={at} download className="font-bold underline">
          All of it as JSON
        </a>
      </p>
      <p className="flex flex-wrap gap-x-4 gap-y-2 pt-2">
        CSV:
        {[...kinds, 'unseparated'].map((kind) => (
          <a key={kind} href={`${at}&kind=${kind}`} download className="underline">
            {kind}
          </a>
        ))}
      </p>
    </details>
  )
}
