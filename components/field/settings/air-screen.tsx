'use client'

import { useDraft } from '@/components/store/use-draft'
import { Field } from '@/components/ui/field'
import type { Job } from '@/lib/model/job'
import type { OpInput } from '@/lib/sync/protocol/op'
import { airProblem, typedNumber } from '../intake/intake-rules'
import { OfJob } from '../of-job'
import { usePatch } from '../use-patch'
import { type Refusal, SettingScreen } from './setting-screen'

type AirDraft = { air: string | null; weather: string | null }
const EMPTY: AirDraft = { air: null, weather: null }

/** Air temperature and weather of a job. */
export function AirScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{({ job }) => <AirForm job={job} />}</OfJob>
}

function AirForm({ job }: { job: Job }) {
  const key = `job.${job.id}.air`
  const { value: draft, set, ready } = useDraft<AirDraft>(key, EMPTY)
  const change = usePatch(draft, set)
  const air = draft.air ?? (job.airTempC === null ? '' : String(job.airTempC).replace('-', '−'))
  const weather = draft.weather ?? job.weather ?? ''
  return (
    <SettingScreen
      jobId={job.id}
      title="Air"
      second="Saved on this phone as you type."
      saveWords="Save air"
      ready={ready}
      draftKey={key}
      read={() => read(job, air, weather)}
    >
      {(errorOf) => (
        <>
          <Field
            label="Air temperature, °C"
            hint="A meter and a coil read differently in the cold."
            value={air}
            onChange={(next) => change({ air: next.slice(0, 6) })}
            inputMode="text"
            figures
            error={errorOf('airTempC')}
          />
          <Field
            label="Weather"
            value={weather}
            onChange={(next) => change({ weather: next })}
            maxLength={120}
            autoCapitalize="sentences"
          />
        </>
      )}
    </SettingScreen>
  )
}

/** What changed, each value as an op of its own. */
function read(job: Job, air: string, weather: string): OpInput[] | Refusal {
  const problem = airProblem(air)
  if (problem !== null) return { field: 'airTempC', words: problem }
  const ops: OpInput[] = []
  const jobId = job.id
  const airTempC = typedNumber(air)
  if (airTempC !== job.airTempC) {
    ops.push({ kind: 'job.set', jobId, fields: { field: 'airTempC', value: airTempC } })
  }
  const words = weather.trim() === '' ? null : weather.trim()
  if (words !== job.weather) {
    ops.push({ kind: 'job.set', jobId, fields: { field: 'weather', value: words } })
  }
  return ops
}
