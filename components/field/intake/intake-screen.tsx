'use client'

import { useState } from 'react'
import { NotYours, useMay } from '@/components/checks/use-may'
import { useSave } from '@/components/checks/use-save'
import { useBook } from '@/components/store/use-book'
import { useDraft } from '@/components/store/use-draft'
import { useShop } from '@/components/store/use-rows'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { jobHref } from '../route'
import { useRoute } from '../router'
import { usePatch } from '../use-patch'
import { ComplaintStep } from './complaint-step'
import { EMPTY_INTAKE, INTAKE_KEY, type IntakeDraft, type IntakeStep, STEPS } from './intake-draft'
import { missingFrom } from './intake-rules'
import { MachineStep } from './machine-step'
import { opsOf } from './open-job'
import { PeopleStep } from './people-step'
import { PlaceStep } from './place-step'

const TITLES: Record<IntakeStep, string> = {
  people: 'People first',
  machine: 'Which machine?',
  complaint: 'The complaint',
  place: 'Where is it?',
}

/** A new job in four steps, kept to the keystroke; for those who may open one. */
export function IntakeScreen() {
  if (useMay('job.open')) return <Intake />
  return (
    <Screen title="New job">
      <NotYours what="Opening a job" />
    </Screen>
  )
}

function Intake() {
  const { value: draft, set, clear, ready, kept } = useDraft<IntakeDraft>(INTAKE_KEY, EMPTY_INTAKE)
  const { go, here } = useRoute()
  const save = useOpenJob(draft)
  const [told, setTold] = useState(false)
  const at = STEPS.indexOf(draft.step)
  const missing = missingFrom(draft, draft.step)
  const change = usePatch(draft, set)
  const move = (by: number) => {
    const step = STEPS[at + by]
    if (step !== undefined) {
      setTold(false)
      change({ step })
      window.scrollTo(0, 0)
      document.getElementById('screen-title')?.focus()
    }
  }
  const onward = () => {
    if (missing !== null) {
      setTold(true)
      return
    }
    if (at < STEPS.length - 1) {
      move(1)
    } else {
      void save.run()
    }
  }
  const Step = {
    people: PeopleStep,
    machine: MachineStep,
    complaint: ComplaintStep,
    place: PlaceStep,
  }[draft.step]
  return (
    <Screen
      title={TITLES[draft.step]}
      second={`New job, step ${at + 1} of ${STEPS.length}.`}
      kept={kept}
      foot={
        <>
          <p role="status" className="font-bold text-nogo empty:hidden">
            {told && missing !== null ? missing : save.problem}
          </p>
          <div className="flex gap-2">
            {at > 0 ? (
              <Key className="key-tall" onClick={() => move(-1)}>
                Step back
              </Key>
            ) : null}
            <Key kind="main" disabled={!ready || save.saving} onClick={onward}>
              {onwardWords(draft)}
            </Key>
          </div>
        </>
      }
    >
      <Step draft={draft} change={change} />
      {at === 0 && draft !== EMPTY_INTAKE ? (
        <details>
          <summary className="fold">Throw this new job away</summary>
          <Hold
            label="Throw it away"
            question="Throw away what was typed?"
            confirmLabel="Throw away"
            onConfirm={() => {
              clear()
                .then(() => go('/field', { replace: true, from: here }))
                .catch(() => announce('Could not be thrown away.', 'assertive'))
            }}
          />
        </details>
      ) : null}
    </Screen>
  )
}

function onwardWords(draft: IntakeDraft): string {
  if (draft.step === 'place') {
    return 'Open the job'
  }
  return draft.step === 'people' && draft.dangers.length === 0 ? 'All well, go on' : 'Go on'
}

/** Records the machine, the job and its first lines in one piece, then goes to the job. */
function useOpenJob(draft: IntakeDraft) {
  const { save, saving, problem } = useSave()
  const stamp = useStamp()
  const shop = useShop()
  const { index } = useBook()
  const { go, here } = useRoute()
  const run = async () => {
    const symptomName =
      draft.symptom === null ? null : (index?.symptoms.get(draft.symptom)?.name ?? null)
    const { jobId, ops } = opsOf(draft, {
      stamp,
      symptomName,
      emergencyNumber: shop?.emergencyNumber ?? null,
    })
    if (!(await save(ops, { clearDrafts: [INTAKE_KEY] }))) return
    announce('Job opened and saved on this phone.')
    go(jobHref(jobId), { replace: true, from: here })
  }
  return { run, saving, problem }
}
