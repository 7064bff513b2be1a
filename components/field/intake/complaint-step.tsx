'use client'

import { useMemo, useState } from 'react'
import { useBook } from '@/components/store/use-book'
import { useMachines, useModels } from '@/components/store/use-rows'
import { Choice, ChoiceMany } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import { RuleEdge } from '@/components/ui/rule-edge'
import { letsThrough } from '@/lib/diag/gate'
import type { SymptomItem } from '@/lib/model/code-book'
import type { Features } from '@/lib/model/features'
import { BEFORE } from '@/lib/model/job'
import { BEFORE_WORDS } from '../words'
import type { IntakeDraft, StepProps } from './intake-draft'

/** What it does: from the list, searched as riders say it, and in the rider's own words. */
export function ComplaintStep({ draft, change }: StepProps) {
  const [wanted, setWanted] = useState('')
  const { index } = useBook()
  const features = useDraftFeatures(draft)
  const found = useMemo(
    () => search([...(index?.symptoms.values() ?? [])], features, wanted),
    [index, features, wanted],
  )
  const picked = draft.symptom === null ? undefined : index?.symptoms.get(draft.symptom)
  return (
    <>
      <Field
        label="In the rider’s own words"
        value={draft.words}
        onChange={(words) => change({ words })}
        lines={2}
        maxLength={500}
        autoCapitalize="sentences"
      />
      <RuleEdge>What does it do?</RuleEdge>
      {index === null ? (
        <p className="text-ink2">
          The list comes with the code book, which is not on this phone yet. The rider’s words are
          enough to open the job.
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
            value={draft.symptom}
            onChange={(symptom) => change({ symptom, conditions: [] })}
            options={(picked && !found.includes(picked) ? [picked, ...found] : found).map((s) => ({
              value: s.id,
              label: s.name,
            }))}
          />
          {found.length === 0 ? <p>Nothing fits. The rider’s own words are enough.</p> : null}
        </>
      )}
      {picked && picked.conditions.length > 0 ? (
        <ChoiceMany
          legend="When does it do it?"
          columns={2}
          value={draft.conditions}
          onChange={(conditions) => change({ conditions })}
          options={picked.conditions.map((c) => ({ value: c.id, label: c.name }))}
        />
      ) : null}
      <Choice
        legend="Is the engine lamp on?"
        columns={3}
        value={draft.lamp}
        onChange={(lamp) => change({ lamp })}
        options={[
          { value: 'on', label: 'On' },
          { value: 'off', label: 'Off' },
          { value: 'notLooked', label: 'Not seen' },
        ]}
      />
      <ChoiceMany
        legend="What happened just before?"
        columns={2}
        value={draft.before}
        onChange={(before) => change({ before: onlyNothingAlone(before, draft.before) })}
        options={BEFORE.map((value) => ({ value, label: BEFORE_WORDS[value] }))}
      />
    </>
  )
}

/** "Nothing known" stands alone: picking it clears the rest, picking another clears it. */
function onlyNothingAlone(
  next: IntakeDraft['before'],
  was: IntakeDraft['before'],
): IntakeDraft['before'] {
  if (next.includes('nothing') && !was.includes('nothing')) {
    return ['nothing']
  }
  return next.length > 1 ? next.filter((value) => value !== 'nothing') : next
}

/** Features of the machine in the draft: of the stranger as answered, of the fleet from its model. */
function useDraftFeatures(draft: IntakeDraft): Features {
  const machine = useMachines()?.find((m) => m.id === draft.machineId)
  const model = useModels()?.find((m) => m.id === machine?.modelId)
  const stranger = draft.stranger?.features
  return useMemo(
    () => stranger ?? { ...model?.features, ...machine?.features },
    [stranger, machine, model],
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
