'use client'

import { useEffect, useRef, useState } from 'react'
import { classes } from './class-names'
import { Key } from './key'

/** How long a finger must stay, in milliseconds. */
const HOLD_MS = 800

type Props = {
  /** What happens, e.g. "Record codes cleared". */
  label: string
  /** Asked of who presses without holding (keyboard, switch): two plain keys follow. */
  question: string
  confirmLabel: string
  onConfirm: () => void
  disabled?: boolean
}

/** Whether a finger or the main button holds it: the others open menus. */
export const isHeldDown = (press: { button: number }, disabled: boolean): boolean =>
  !disabled && press.button === 0

/**
 * Whether a press asks: one from keyboard or switch (no `detail`) always does, that which ends a hold does not.
 */
export const isAsking = (press: { detail: number }, wasHeld: boolean): boolean =>
  !wasHeld || press.detail === 0

/** Hold 800 ms to confirm, or press once and answer with one of two keys. */
export function Hold({ label, question, confirmLabel, onConfirm, disabled = false }: Props) {
  const [held, setHeld] = useState(false)
  const [asking, setAsking] = useState(false)
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null)
  const done = useRef<boolean>(false)
  const letGo = () => {
    if (timer.current !== null) {
      clearTimeout(timer.current)
      timer.current = null
    }
    setHeld(false)
  }
  useEffect(() => () => (timer.current === null ? undefined : clearTimeout(timer.current)), [])
  const key = useRef<HTMLButtonElement>(null)
  const answer = () => {
    setAsking(false)
    key.current?.focus()
  }
  const press = (event: { button: number }) => {
    if (!isHeldDown(event, disabled)) {
      return
    }
    done.current = false
    setHeld(true)
    timer.current = setTimeout(() => {
      done.current = true
      letGo()
      setAsking(false)
      onConfirm()
    }, HOLD_MS)
  }
  return (
    <div className="grid gap-2">
      <Key
        ref={key}
        disabled={disabled}
        className={classes('relative w-full select-none', held && 'hold-on')}
        onPointerDown={press}
        onPointerUp={letGo}
        onPointerLeave={letGo}
        onPointerCancel={letGo}
        onContextMenu={(e) => e.preventDefault()}
        onClick={(event) => {
          const asks = isAsking(event, done.current)
          done.current = false
          if (asks) {
            setAsking(true)
          }
        }}
      >
        {label}
        <span className="hold-fill" aria-hidden="true" />
      </Key>
      {asking ? (
        <fieldset className="grid gap-2 border-2 border-ink p-3">
          <legend className="px-1 font-bold">{question}</legend>
          <div className="grid grid-cols-1 gap-2 slim:grid-cols-2">
            <Key small onClick={answer}>
              No
            </Key>
            <Key
              small
              kind="plate"
              onClick={() => {
                answer()
                onConfirm()
              }}
            >
              {confirmLabel}
            </Key>
          </div>
        </fieldset>
      ) : (
        <p className="text-second text-ink2">
          Hold the key for a second, or press once and answer.
        </p>
      )}
    </div>
  )
}
