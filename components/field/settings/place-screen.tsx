'use client'

import { useDraft } from '@/components/store/use-draft'
import { useStamp } from '@/components/store/use-stamp'
import { Field } from '@/components/ui/field'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { Job } from '@/lib/model/job'
import type { OpInput } from '@/lib/sync/protocol/op'
import type { IntakeDraft } from '../intake/intake-draft'
import { placeProblem } from '../intake/intake-rules'
import { afterFix, afterTyping, NO_PLACE } from '../intake/place-draft'
import { FixPart, TypedPart } from '../intake/place-step'
import { OfJob } from '../of-job'
import { PlaceShown } from '../place-shown'
import { usePatch } from '../use-patch'
import { type Refusal, SettingScreen } from './setting-screen'

type PlaceDraft = Pick<IntakeDraft, 'place' | 'placeText' | 'lastFix'> & { words: string | null }
const EMPTY: PlaceDraft = { ...NO_PLACE, words: null }

/** A better position for a job: taken again, or typed. The one before is kept at the shop. */
export function PlaceScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{({ job }) => <PlaceForm job={job} />}</OfJob>
}

function PlaceForm({ job }: { job: Job }) {
  const key = `job.${job.id}.place`
  const { value: draft, set, ready } = useDraft<PlaceDraft>(key, EMPTY)
  const stamp = useStamp()
  const change = usePatch(draft, set)
  const words = draft.words ?? job.place?.words ?? ''
  return (
    <SettingScreen
      jobId={job.id}
      title="Better position"
      second="Saved on this phone as you type."
      saveWords="Save position"
      ready={ready}
      draftKey={key}
      read={() => read(job, draft, words)}
    >
      {() => (
        <>
          <FixPart place={draft.place} onPlace={(place) => change(afterFix(place))} />
          <TypedPart
            text={draft.placeText}
            near={job.place}
            onText={(text) => change(afterTyping(draft, text, stamp.now()))}
          />
          {draft.place === null ? null : <PlaceShown place={draft.place} />}
          <Field
            label="The place in words"
            hint="Trail, marker, what stands there."
            value={words}
            onChange={(next) => change({ words: next })}
            maxLength={200}
            autoCapitalize="sentences"
          />
          {job.place === null ? null : (
            <section className="grid gap-2">
              <RuleEdge>As it stands now</RuleEdge>
              <PlaceShown place={job.place} />
            </section>
          )}
        </>
      )}
    </SettingScreen>
  )
}

/** The new place as an op; words alone may change as well. */
function read(job: Job, draft: PlaceDraft, text: string): OpInput[] | Refusal {
  const problem = placeProblem(draft)
  // The box of a typed position says itself what is wrong with it.
  if (problem !== null) return { field: null, words: problem }
  const place = draft.place ?? job.place
  if (place === null) return { field: null, words: 'Take the position, or type it.' }
  const words = text.trim() === '' ? null : text.trim()
  if (draft.place === null && words === place.words) return []
  const value = { ...place, words }
  return [{ kind: 'job.set', jobId: job.id, fields: { field: 'place', value } }]
}
