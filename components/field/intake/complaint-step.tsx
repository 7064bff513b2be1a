'use client'

import { useMemo } from 'react'
import { useMachines, useModels } from '@/components/store/use-rows'
import { Choice, ChoiceMany } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import type { Features } from '@/lib/model/features'
import { BEFORE } from '@/lib/model/job'
import { SymptomPick } from '../symptom-pick'
import { BEFORE_WORDS } from '../words'
import type { IntakeDraft, StepProps } from './intake-draft'

/** What it does: from the list, searched as riders say it, and in the rider's own words. */
export function ComplaintStep({ draft, change }: StepProps) {
  const features = useDraftFeatures(draft)
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
      <SymptomPick
        features={features}
        said={draft.words}
        symptom={draft.symptom}
        conditions={draft.conditions}
        change={change}
      />
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
