'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useId } from 'react'
import { type Control, Controller, useForm, useWatch } from 'react-hook-form'
import { of100 } from '@/components/reading-strip/figures'
import { Choice } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import type { Suspect } from '@/lib/diag/belief'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import { CAUSE_GRADES } from '@/lib/model/closing'
import { GRADE_WORDS } from '@/lib/shop/closing'
import {
  type CloseForm,
  type ClosingBoxes,
  closingBoxes,
  closingOf,
  OWN_WORDS,
  wantsCause,
} from './closing.schema'

type Props = {
  busy: boolean
  suspects: readonly Suspect[]
  onSend: (closing: CloseForm['closing']) => void
}

const EMPTY: ClosingBoxes = { grade: null, cause: '', causeWords: '', reason: '' }

/** What each grade asks for (rule R25). */
const GRADE_HINTS = {
  proved: 'By swap and back, or the broken part was seen.',
  likely: 'The evidence points there, the proof is missing.',
  unknown: 'It runs or it stands, and nobody knows why.',
  noFaultFound: 'Looked for, and nothing was wrong.',
} as const

const GRADES = CAUSE_GRADES.map((value) => ({
  value,
  label: GRADE_WORDS[value],
  hint: GRADE_HINTS[value],
}))

/** How sure, the cause where there is one, and a reason. */
export function CloseBoxes({ busy, suspects, onSend }: Props) {
  const { control, handleSubmit } = useForm<ClosingBoxes>({
    resolver: zodResolver(closingBoxes),
    defaultValues: EMPTY,
  })
  const [grade, cause] = useWatch({ control, name: ['grade', 'cause'] })
  return (
    <form
      className="mt-3 grid gap-4"
      noValidate
      onSubmit={(event) => void handleSubmit((boxes) => onSend(closingOf(boxes)))(event)}
    >
      <Controller
        control={control}
        name="grade"
        render={({ field, fieldState }) => (
          <Choice
            legend="How sure is the cause?"
            value={field.value}
            onChange={field.onChange}
            options={GRADES}
            error={fieldState.error?.message ?? null}
          />
        )}
      />
      {wantsCause({ grade }) ? (
        <>
          <CauseBox control={control} suspects={suspects} />
          {cause === OWN_WORDS ? (
            <Box
              control={control}
              name="causeWords"
              label="The cause in your own words"
              max={300}
            />
          ) : null}
        </>
      ) : null}
      <Box control={control} name="reason" label="What was done, or why it ends here" max={500} />
      <Key type="submit" kind="plate" disabled={busy}>
        Close the job
      </Key>
    </form>
  )
}

type CauseProps = { control: Control<ClosingBoxes>; suspects: readonly Suspect[] }

/** The suspects as they stand, and own words for a cause that is not among them. */
function CauseBox({ control, suspects }: CauseProps) {
  const id = useId()
  const listed = suspects.filter(({ fault }) => fault !== SOMETHING_ELSE)
  return (
    <Controller
      control={control}
      name="cause"
      render={({ field, fieldState }) => (
        <div className="grid gap-1">
          <label htmlFor={id} className="text-body font-bold">
            The cause
          </label>
          <select
            id={id}
            className="field-box"
            value={field.value}
            onChange={field.onChange}
            aria-invalid={fieldState.error !== undefined}
            aria-describedby={fieldState.error ? `${id}-error` : undefined}
          >
            <option value="">Choose</option>
            {listed.map(({ fault, name, chance }) => (
              <option key={fault} value={fault}>
                {name}, {of100(chance)} of 100
              </option>
            ))}
            <option value={OWN_WORDS}>In my own words</option>
          </select>
          {fieldState.error ? (
            <p id={`${id}-error`} className="text-second font-bold text-nogo">
              {fieldState.error.message}
            </p>
          ) : null}
        </div>
      )}
    />
  )
}

type BoxProps = {
  control: Control<ClosingBoxes>
  name: 'causeWords' | 'reason'
  label: string
  max: number
}

function Box({ control, name, label, max }: BoxProps) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Field
          label={label}
          lines={2}
          maxLength={max}
          value={field.value}
          onChange={field.onChange}
          error={fieldState.error?.message ?? null}
        />
      )}
    />
  )
}
