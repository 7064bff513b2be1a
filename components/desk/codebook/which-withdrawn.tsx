import { useState } from 'react'
import { Choice } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import type { BookVersionRow, Withdrawable } from '@/lib/model/book-desk'
import type { Withdrawn } from '@/lib/model/book-withdrawal'
import { readSentence } from '../desk-sentences'
import { useWithdrawable } from './use-books'

/** So many names are offered at a time (a choice): what a phone shows without much scrolling. */
const MOST_OFFERED = 6

const LABELS = {
  check: 'Which check',
  swap: 'Which swap',
  fault: 'Which fault',
  limit: 'The limit of which check',
} as const

type Picking = { which: string; onPick: (which: string) => void }

/** Which one is withdrawn: a version by its number, anything else by its name. */
export function WhichWithdrawn({
  what,
  versions,
  ...picking
}: Picking & { what: Withdrawn; versions: readonly BookVersionRow[] }) {
  if (what !== 'version') return <WhichItem what={what} {...picking} />
  const options = versions
    .filter(({ state }) => state === 'published')
    .map(({ version }) => ({ value: String(version), label: `Version ${version}` }))
  return (
    <Choice
      legend="Which version"
      options={options}
      columns={2}
      value={picking.which}
      onChange={picking.onPick}
    />
  )
}

function WhichItem({ what, which, onPick }: Picking & { what: keyof typeof LABELS }) {
  const { data, error, isPending } = useWithdrawable()
  const [typed, setTyped] = useState('')
  const all = (data?.items ?? []).filter((one) => one.what === what)
  const found = matching(all, typed)
  // The one that is chosen stays in sight whatever is typed.
  const chosen = all.filter(({ id }) => id === which && !found.some((one) => one.id === id))
  const offered = [...chosen, ...found.slice(0, MOST_OFFERED - chosen.length)]
  const more = found.length + chosen.length - offered.length
  if (error) return <p className="font-bold text-nogo">{readSentence(error)}</p>
  if (isPending) return <p>Reading the code book.</p>
  return (
    <div className="grid gap-3">
      <Field
        label={LABELS[what]}
        hint="Type a word of its name, or its id."
        value={typed}
        onChange={setTyped}
        maxLength={64}
        inputMode="search"
      />
      {offered.length === 0 ? null : (
        <Choice
          legend={LABELS[what]}
          legendHidden
          options={offered.map(({ id, name }) => ({ value: id, label: name, hint: id }))}
          value={which}
          onChange={onPick}
        />
      )}
      <p role="status" className="text-second text-ink2">
        {sayMore(found.length, more)}
      </p>
    </div>
  )
}

function sayMore(found: number, more: number): string {
  if (found === 0) return 'Nothing of that name is in the newest version. Try another word.'
  return more > 0 ? `${more} more. Type more of its name.` : ''
}

/** Those whose name or id has every word that was typed. */
function matching(all: readonly Withdrawable[], typed: string): Withdrawable[] {
  const words = typed.toLowerCase().split(/\s+/).filter(Boolean)
  return all.filter(({ id, name }) => {
    const said = `${name} ${id}`.toLowerCase()
    return words.every((word) => said.includes(word))
  })
}
