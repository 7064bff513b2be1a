import { type HTMLInputTypeAttribute, type ReactNode, useId } from 'react'
import { classes } from './class-names'

type Props = {
  label: string
  value: string
  onChange: (next: string) => void
  /** One sentence under the label. */
  hint?: ReactNode
  /** What is wrong and what to type instead; null when nothing is. */
  error?: string | null
  lines?: number
  type?: HTMLInputTypeAttribute
  inputMode?: 'text' | 'numeric' | 'decimal' | 'search' | 'none'
  placeholder?: string
  autoComplete?: string
  autoCapitalize?: 'off' | 'characters' | 'sentences'
  maxLength?: number
  required?: boolean
  name?: string
  /** Figures in the figure face. */
  figures?: boolean
  className?: string
}

/** A label, a box to type in, and a sentence where something is wrong. */
export function Field(props: Props) {
  const id = useId()
  const { label, hint, error = null, lines = 1, figures = false } = props
  const described = [hint ? `${id}-hint` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ')
  const shared = {
    id,
    name: props.name,
    value: props.value,
    onChange: (e: { target: { value: string } }) => props.onChange(e.target.value),
    placeholder: props.placeholder,
    autoComplete: props.autoComplete ?? 'off',
    autoCapitalize: props.autoCapitalize,
    maxLength: props.maxLength,
    required: props.required,
    'aria-invalid': error !== null,
    'aria-describedby': described || undefined,
    className: classes('field-box', figures && 'figures'),
  }
  return (
    <div className={classes('grid gap-1.5', props.className)}>
      <label htmlFor={id} className="text-body font-bold">
        {label}
      </label>
      {hint ? (
        <p id={`${id}-hint`} className="text-second text-ink2">
          {hint}
        </p>
      ) : null}
      {lines > 1 ? (
        <textarea rows={lines} {...shared} />
      ) : (
        <input type={props.type ?? 'text'} inputMode={props.inputMode} {...shared} />
      )}
      {error ? (
        <p id={`${id}-error`} className="text-second font-bold text-nogo">
          {error}
        </p>
      ) : null}
    </div>
  )
}
