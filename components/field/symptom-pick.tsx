'use client'

import { useMemo, useState } from 'react'
import { useBook } from '@/components/store/use-book'
import { SymptomCautions } from '@/components/suspects/symptom-cautions'
import { Choice, ChoiceMany } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { SymptomItem } from '@/lib/model/code-book'
import type { Features } from '@/lib/model/features'
import { oneEach, questions } from './symptom-questions'
import { SymptomSearch } from './symptom-search'

/** What a machine does, as picked: a symptom of the code book and when it shows. */
export type Symptom = { symptom: string | null; conditions: string[] }
type Props = Symptom & {
  features: Features
  /** What the rider said: what it speaks of stands first. */
  said?: string
  change: (next: Partial<Symptom>) => void
}

/** How many are shown before the rest is asked for. */
const AT_FIRST = 6

/** What it does, from the symptoms that fit the machine, searched as riders say it. */
export function SymptomPick({ features, said = '', symptom, conditions, change }: Props) {
  const [wanted, setWanted] = useState('')
  const [all, setAll] = useState(false)
  const { index } = useBook()
  const search = useMemo(
    () => new SymptomSearch([...(index?.symptoms.values() ?? [])], features),
    [index, features],
  )
  const found = useMemo(() => offered(search, wanted.trim(), said), [search, wanted, said])
  const picked = symptom === null ? undefined : index?.symptoms.get(symptom)
  const short = all || wanted.trim() !== '' ? found : found.slice(0, AT_FIRST)
  const shown = picked && !short.includes(picked) ? [picked, ...short] : short
  return (
    <>
      <RuleEdge>What does it do?</RuleEdge>
      {index === null ? (
        <p className="text-ink2">
          The list comes with the code book, which is not on this phone yet. Until then the rider’s
          words are kept.
        </p>
      ) : (
        <>
          <Field
            label="Search as the rider says it"
            value={wanted}
            onChange={setWanted}
            type="search"
            inputMode="search"
            autoCapitalize="off"
          />
          <Choice
            legend="What does it do?"
            legendHidden
            value={symptom}
            onChange={(next) => change({ symptom: next, conditions: [] })}
            options={shown.map((s) => ({ value: s.id, label: s.name }))}
          />
          {found.length === 0 ? <p>Nothing in the list fits. The rider’s words are kept.</p> : null}
          {short.length < found.length ? (
            <Key small onClick={() => setAll(true)}>
              All {found.length} of the list
            </Key>
          ) : null}
        </>
      )}
      {picked ? <SymptomCautions symptom={picked} /> : null}
      {picked
        ? questions(picked).map((question) => (
            <ChoiceMany
              key={question ?? ''}
              legend={question ?? 'What else is there to say of it?'}
              columns={2}
              value={conditions}
              onChange={(next) => change({ conditions: oneEach(picked, conditions, next) })}
              options={picked.conditions
                .filter((c) => c.answers === question)
                .map((c) => ({ value: c.id, label: c.name }))}
            />
          ))
        : null}
    </>
  )
}

/** What was looked for; with nothing looked for, all, those first that the rider's words speak of. */
function offered(search: SymptomSearch, wanted: string, said: string): readonly SymptomItem[] {
  return wanted === '' ? [...new Set([...search.find(said), ...search.all])] : search.find(wanted)
}
