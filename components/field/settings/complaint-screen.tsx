'use client'

import { useDraft } from '@/components/store/use-draft'
import { Field } from '@/components/ui/field'
import type { Job } from '@/lib/model/job'
import type { OpInput } from '@/lib/sync/protocol/op'
import { OfJob } from '../of-job'
import { type Refusal, SettingScreen } from './setting-screen'

/** The complaint in the rider's words, should they say it better later. What it does stays as recorded. */
export function ComplaintScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{({ job }) => <ComplaintForm job={job} />}</OfJob>
}

function ComplaintForm({ job }: { job: Job }) {
  const key = `job.${job.id}.complaint`
  const { value: words, set, ready } = useDraft<string>(key, job.complaint.words)
  return (
    <SettingScreen
      jobId={job.id}
      title="Complaint"
      second="The words before are kept at the shop."
      saveWords="Save complaint"
      ready={ready}
      draftKey={key}
      read={() => read(job, words)}
    >
      {(errorOf) => (
        <Field
          label="In the rider’s own words"
          value={words}
          onChange={set}
          lines={4}
          maxLength={500}
          autoCapitalize="sentences"
          error={errorOf('complaintWords')}
        />
      )}
    </SettingScreen>
  )
}

function read(job: Job, text: string): OpInput[] | Refusal {
  const value = text.trim()
  if (value === '') return { field: 'complaintWords', words: 'Write what the rider says.' }
  if (value === job.complaint.words) return []
  return [{ kind: 'job.set', jobId: job.id, fields: { field: 'complaintWords', value } }]
}
