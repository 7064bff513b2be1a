import { type ReactNode, useId } from 'react'
import { classes } from './class-names'

type Option<T extends string> = {
  value: T
  label: string
  hint?: ReactNode
  disabled?: boolean
}

type Shared<T extends string> = {
  legend: string
  /** The legend is read out but not drawn, for a heading that already says it. */
  legendHidden?: boolean
  hint?: ReactNode
  options: readonly Option<T>[]
  /** Columns from 360 px up; one below. */
  columns?: 1 | 2 | 3
  error?: string | null
  className?: string
}

type One<T extends string> = Shared<T> & { value: T | null; onChange: (next: T) => void }
type Many<T extends string> = Shared<T> & { value: readonly T[]; onChange: (next: T[]) => void }

const COLUMNS = {
  1: 'grid-cols-1',
  2: 'grid-cols-1 slim:grid-cols-2',
  3: 'grid-cols-1 slim:grid-cols-3',
}

/** Big radio keys: one of several. */
export function Choice<T extends string>({ value, onChange, ...shared }: One<T>) {
  return (
    <Keys
      {...shared}
      type="radio"
      chosen={(v) => v === value}
      onPick={(v) => {
        onChange(v)
      }}
    />
  )
}

/** Big check keys: any of several, kept in the order of the options. */
export function ChoiceMany<T extends string>({ value, onChange, ...shared }: Many<T>) {
  const pick = (picked: T, on: boolean) => {
    const wanted = new Set(value)
    if (on) {
      wanted.add(picked)
    } else {
      wanted.delete(picked)
    }
    onChange(shared.options.map((o) => o.value).filter((v) => wanted.has(v)))
  }
  return <Keys {...shared} type="checkbox" chosen={(v) => value.includes(v)} onPick={pick} />
}

function Keys<T extends string>(
  props: Shared<T> & {
    type: 'radio' | 'checkbox'
    chosen: (value: T) => boolean
    onPick: (value: T, on: boolean) => void
  },
) {
  const name = useId()
  const described = [props.hint ? `${name}-hint` : '', props.error ? `${name}-error` : '']
    .filter(Boolean)
    .join(' ')
  return (
    <fieldset
      className={classes('min-w-0', props.className)}
      aria-describedby={described || undefined}
      data-invalid={props.error ? true : undefined}
    >
      <legend
        className={
          props.legendHidden ? 'visually-hidden' : 'mb-1.5 text-body font-bold leading-tight'
        }
      >
        {props.legend}
      </legend>
      {props.hint ? (
        <p id={`${name}-hint`} className="mb-1.5 text-second text-ink2">
          {props.hint}
        </p>
      ) : null}
      <div className={classes('grid gap-2', COLUMNS[props.columns ?? 1])}>
        {props.options.map((option) => (
          <label
            key={option.value}
            className={classes('choice', props.columns === 3 && 'choice-tight')}
          >
            <input
              type={props.type}
              name={name}
              value={option.value}
              checked={props.chosen(option.value)}
              disabled={option.disabled ?? false}
              onChange={(e) => props.onPick(option.value, e.target.checked)}
            />
            <Mark round={props.type === 'radio'} />
            <span className="min-w-0">
              {option.label}
              {option.hint ? (
                <span className="block text-second font-normal">{option.hint}</span>
              ) : null}
            </span>
          </label>
        ))}
      </div>
      {props.error ? (
        <p id={`${name}-error`} className="mt-1.5 text-second font-bold text-nogo">
          {props.error}
        </p>
      ) : null}
    </fieldset>
  )
}

function Mark({ round }: { round: boolean }) {
  return (
    <svg className="choice-mark" viewBox="0 0 28 28" fill="none" aria-hidden="true">
      {round ? (
        <circle cx="14" cy="14" r="11" stroke="currentColor" strokeWidth="2.6" />
      ) : (
        <rect x="3" y="3" width="22" height="22" stroke="currentColor" strokeWidth="2.6" />
      )}
      {round ? (
        <circle className="on" cx="14" cy="14" r="6" fill="currentColor" />
      ) : (
        <path className="on" d="M8 14.5 12.5 19 20.5 9" stroke="currentColor" strokeWidth="3.4" />
      )}
    </svg>
  )
}
