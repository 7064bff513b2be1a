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
  const [asking, setAsking] = useState(false)
  const key = useRef<HTMLButtonElement>(null)
  const holding = useHolding(disabled, () => {
    setAsking(false)
    onConfirm()
  })
  // The two keys go away under the focus: it goes back to the one that asked.
  const close = () => {
    setAsking(false)
    key.current?.focus()
  }
  return (
    <div className="grid gap-2">
      <Key
        ref={key}
        disabled={disabled}
        className={classes('relative w-full select-none', holding.held && 'hold-on')}
        onPointerDown={holding.press}
        onPointerUp={holding.release}
        onPointerLeave={holding.release}
        onPointerCancel={holding.release}
        onContextMenu={(e) => e.preventDefault()}
        onClick={(event) => {
          if (isAsking(event, holding.endOfHold())) {
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
            <Key small onClick={close}>
              No
            </Key>
            <Key
              small
              kind="plate"
              onClick={() => {
                close()
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

/** The finger on the key: calls `onHeld` once it has stayed long enough. */
function useHolding(disabled: boolean, onHeld: () => void) {
  const [held, setHeld] = useState(false)
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null)
  const done = useRef<boolean>(false)
  const release = () => {
    if (timer.current !== null) {
      clearTimeout(timer.current)
      timer.current = null
    }
    setHeld(false)
  }
  useEffect(() => () => (timer.current === null ? undefined : clearTimeout(timer.current)), [])
  const press = (event: { button: number }) => {
    if (!isHeldDown(event, disabled)) {
      return
    }
    done.current = false
    setHeld(true)
    timer.current = setTimeout(() => {
      done.current = true
      release()
      onHeld()
    }, HOLD_MS)
  }
  /** Whether the press that is ending now was a hold; asked once. */
  const endOfHold = () => {
    const was = done.current
    done.current = false
    return was
  }
  return { held, press, release, endOfHold }
}
