'use client'

import { useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { useDraft } from '@/components/store/use-draft'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { OfJob } from '../of-job'
import { jobHref } from '../route'
import { useRoute } from '../router'
import { type Symptom, SymptomPick } from '../symptom-pick'
import type { JobFacts } from '../use-job-facts'
import { usePatch } from '../use-patch'

const NONE: Symptom = { symptom: null, conditions: [] }

/** What the machine does, taken down after the job was opened: the first of it, or one more. */
export function SymptomScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{(facts) => <OneSymptom facts={facts} />}</OfJob>
}

function OneSymptom({ facts }: { facts: JobFacts }) {
  const jobId = facts.job.id
  const key = `job.${jobId}.symptom`
  const { value: draft, set, ready, kept } = useDraft<Symptom>(key, NONE)
  const [missing, setMissing] = useState(false)
  const { save, saving, problem } = useSave()
  const stamp = useStamp()
  const { go, here } = useRoute()
  const patch = usePatch(draft, set)
  const change = (next: Partial<Symptom>) => {
    setMissing(false)
    patch(next)
  }
  const keep = async () => {
    const { symptom, conditions } = draft
    setMissing(symptom === null)
    if (symptom === null) return
    const entry = stamp.entry(jobId, { kind: 'symptom', symptom, conditions, words: null })
    if (!(await save([entry], { clearDrafts: [key] }))) return
    announce('Symptom saved on this phone.')
    go(jobHref(jobId, 'checks'), { replace: true, from: here })
  }
  return (
    <Screen
      title="Symptom"
      kept={kept}
      foot={
        <>
          {missing ? (
            <p role="alert" className="font-bold text-nogo">
              Pick what it does first.
            </p>
          ) : null}
          <Key kind="main" disabled={!ready || saving} onClick={keep}>
            Save symptom
          </Key>
        </>
      }
    >
      <SymptomPick
        features={facts.features}
        said={facts.job.complaint.words}
        {...draft}
        change={change}
      />
      <NotSaved problem={problem} />
    </Screen>
  )
}
