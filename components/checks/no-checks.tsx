'use client'
import type { SymptomItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { SymptomCautions } from '../suspects/symptom-cautions'
import { KeyLink } from '../ui/key'
import { Screen } from '../ui/screen'

/** Nobody has said yet what it does. */
export function NoSymptom({ jobId }: { jobId: Id }) {
  return (
    <Screen
      title="No symptom yet"
      foot={
        <KeyLink kind="main" href={`/field/jobs/${jobId}/symptom`}>
          What does it do?
        </KeyLink>
      }
    >
      <p>The suspects start from what the machine does. Pick that, and they are here.</p>
    </Screen>
  )
}

/** Nothing broke: what is wanted is a way to move it, and what to mind while doing so (rule R4). */
export function NoFault({ jobId, symptoms }: { jobId: Id; symptoms: readonly SymptomItem[] }) {
  return (
    <Screen title="No fault to look for" foot={<ToWayOut jobId={jobId} />}>
      <Cautions symptoms={symptoms} />
      <p>
        {symptoms.map(({ name }) => name).join(', ')}: that is no fault of the machine. The way out
        has what moves it. Should it do anything else besides, add that as a symptom.
      </p>
      <KeyLink small quiet href={`/field/jobs/${jobId}/symptom`}>
        One more symptom
      </KeyLink>
    </Screen>
  )
}

/** What each complaint warns of. */
export const Cautions = ({ symptoms }: { symptoms: readonly SymptomItem[] }) =>
  symptoms.map((symptom) => <SymptomCautions key={symptom.id} symptom={symptom} />)

/** While the sums are done, and when they cannot be. */
export function Waiting({ failed }: { failed: boolean }) {
  return (
    <Screen title="Checks">
      {failed ? (
        <p role="alert">
          The sums could not be done for this job. Nothing recorded is lost, and notes, readings and
          the way out can still be recorded.
        </p>
      ) : (
        <p role="status">Working out the suspects.</p>
      )}
    </Screen>
  )
}

/** The key that leads to the way out. */
export const ToWayOut = ({ jobId }: { jobId: Id }) => (
  <KeyLink kind="main" href={`/field/jobs/${jobId}/wayout`}>
    To the way out
  </KeyLink>
)
