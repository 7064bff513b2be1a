'use client'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'

/** What is half said about an outcome: as written or not, now or earlier. Kept to the keystroke. */
export type HowDone = {
  asWritten: boolean
  differed: string
  earlier: boolean
  about: string
  couldNot: boolean
  reason: string
}
export const FRESH: HowDone = {
  asWritten: true,
  differed: '',
  earlier: false,
  about: '',
  couldNot: false,
  reason: '',
}

type Props = { value: HowDone; onChange: (next: HowDone) => void; timeProblem: string | null }

/** What keeps an outcome from being recorded, in one sentence; null when nothing does. `readable`: the time typed. */
export function missingOf(
  { asWritten, differed, earlier, about }: HowDone,
  readable: boolean,
): string | null {
  if (earlier && about === '') return 'Say at about what time it happened.'
  if (earlier && !readable) return 'The time cannot be read. Type it as 14:05.'
  return !asWritten && differed.trim() === '' ? 'Say in a few words what differed.' : null
}

/** Work first, write after (rule R8): when it happened, and whether the steps were followed. */
export function HowDoneForm({ value, onChange, timeProblem }: Props) {
  return (
    <div className="grid gap-4">
      <Choice
        legend="Done as written"
        columns={2}
        value={value.asWritten ? 'yes' : 'no'}
        onChange={(next) => onChange({ ...value, asWritten: next === 'yes' })}
        options={[
          { value: 'yes', label: 'As written' },
          { value: 'no', label: 'Differed' },
        ]}
      />
      {!value.asWritten && (
        <Field
          label="What differed"
          value={value.differed}
          onChange={(differed) => onChange({ ...value, differed })}
          maxLength={1000}
          lines={2}
        />
      )}
      <Choice
        legend="Happened"
        columns={2}
        value={value.earlier ? 'earlier' : 'now'}
        onChange={(next) => onChange({ ...value, earlier: next === 'earlier' })}
        options={[
          { value: 'now', label: 'Just now' },
          { value: 'earlier', label: 'Earlier' },
        ]}
      />
      {value.earlier && (
        <Field
          label="At about"
          type="time"
          figures
          value={value.about}
          onChange={(about) => onChange({ ...value, about })}
          error={timeProblem}
        />
      )}
    </div>
  )
}
