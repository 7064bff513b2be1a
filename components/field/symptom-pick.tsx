'use client'

import { useMemo, useState } from 'react'
import { useBook } from '@/components/store/use-book'
import { Choice, ChoiceMany } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import { RuleEdge } from '@/components/ui/rule-edge'
import { letsThrough } from '@/lib/diag/gate'
import type { SymptomItem } from '@/lib/model/code-book'
import type { Features } from '@/lib/model/features'

/** What a machine does, as picked: a symptom of the code book and when it shows. */
export type Symptom = { symptom: string | null; conditions: string[] }
type Props = Symptom & { features: Features; change: (next: Partial<Symptom>) => void }

/** What it does, from the symptoms that fit the machine, searched as riders say it. */
export function SymptomPick({ features, symptom, conditions, change }: Props) {
  const [wanted, setWanted] = useState('')
  const { index } = useBook()
  const found = useMemo(
    () => search([...(index?.symptoms.values() ?? [])], features, wanted),
    [index, features, wanted],
  )
  const picked = symptom === null ? undefined : index?.symptoms.get(symptom)
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
            options={(picked && !found.includes(picked) ? [picked, ...found] : found).map((s) => ({
              value: s.id,
              label: s.name,
            }))}
          />
          {found.length === 0 ? <p>Nothing in the list fits. The rider’s words are kept.</p> : null}
        </>
      )}
      {picked && picked.conditions.length > 0 ? (
        <ChoiceMany
          legend="When does it do it?"
          columns={2}
          value={conditions}
          onChange={(next) => change({ conditions: next })}
          options={picked.conditions.map((c) => ({ value: c.id, label: c.name }))}
        />
      ) : null}
    </>
  )
}

function search(
  symptoms: readonly SymptomItem[],
  features: Features,
  wanted: string,
): SymptomItem[] {
  const words = wanted.toLowerCase().split(/\s+/).filter(Boolean)
  return symptoms
    .filter((symptom) => letsThrough(symptom.gate, features))
    .filter((symptom) => {
      const text = [symptom.name, ...symptom.riderWords].join(' ').toLowerCase()
      return words.every((word) => text.includes(word))
    })
}
