'use client'
import { Delete } from 'lucide-react'
import { type RefObject, useEffect, useRef } from 'react'
import { neverNegative, type TypedUnit, unitsOf } from '@/lib/diag/typed-units'
import type { Quantity } from '@/lib/model/meter-profile'
import { unitLabel } from '../reading-strip/unit-words'
import { Key } from '../ui/key'
import { type PadKey, pressed } from './keypad-text'

const DIGITS = ['1', '2', '3', '4', '5', '6', '7', '8', '9', '.', '0'] as const
const PAD = 'min-h-[68px] px-1 [@media(max-height:37.5rem)]:min-h-target'
/** The pad's lower edge eats into its height when pressed, as every key's does. */
const FIGURE = 'figures text-key'

type PadValue = { typed: string; unit: string | null; overRange: boolean }
type Props = {
  quantity: Quantity
  value: PadValue
  unit: TypedUnit
  onChange: (next: PadValue) => void
  onSave: () => void
  saveBlocked: boolean
}

/** The reading keypad: three columns of mitten-sized keys, sign or OL, unit, SAVE. */
export function Keypad({ quantity, value, unit, onChange, onSave, saveBlocked }: Props) {
  const press = (key: PadKey) => onChange({ ...value, typed: pressed(value.typed, key) })
  const pad = useTyping(press)
  return (
    <fieldset ref={pad} className="grid grid-cols-3 gap-1.5">
      <legend className="visually-hidden">Keypad</legend>
      {DIGITS.map((digit) => (
        <Key key={digit} className={`${PAD} ${FIGURE}`} onClick={() => press(digit)}>
          {digit}
        </Key>
      ))}
      <Key className={PAD} aria-label="Delete one" onClick={() => press('back')}>
        <Delete size={30} strokeWidth={2.5} aria-hidden="true" />
      </Key>
      {neverNegative(quantity) ? (
        <Key
          className={`${PAD} ${value.overRange ? 'key-down' : ''}`}
          aria-pressed={value.overRange}
          aria-label="OL, over range on the meter"
          onClick={() => onChange({ ...value, overRange: !value.overRange })}
        >
          OL
        </Key>
      ) : (
        <Key
          className={`${PAD} ${FIGURE}`}
          aria-label="Plus or minus"
          onClick={() => press('sign')}
        >
          +/−
        </Key>
      )}
      <UnitKey quantity={quantity} unit={unit} onPick={(id) => onChange({ ...value, unit: id })} />
      <Key kind="plate" className={PAD} disabled={saveBlocked} onClick={onSave}>
        Save
      </Key>
    </fieldset>
  )
}

/** A native list under a key, so that it opens in the phone's own large form. */
function UnitKey(props: { quantity: Quantity; unit: TypedUnit; onPick: (id: string) => void }) {
  return (
    <span className={`key ${PAD} relative`}>
      <span aria-hidden="true" className="font-text text-section font-bold normal-case">
        {unitLabel(props.quantity, props.unit.id)} ▾
      </span>
      <select
        aria-label="Unit"
        className="absolute inset-0 size-full cursor-pointer opacity-0"
        value={props.unit.id}
        onChange={(event) => props.onPick(event.target.value)}
      >
        {unitsOf(props.quantity).map((one) => (
          <option key={one.id} value={one.id}>
            {unitLabel(props.quantity, one.id)}
          </option>
        ))}
      </select>
    </span>
  )
}

/** A keyboard types on the pad while the focus is on it: single keys are nobody's elsewhere (WCAG 2.1.4). */
function useTyping(press: (key: PadKey) => void): RefObject<HTMLFieldSetElement | null> {
  const pad = useRef<HTMLFieldSetElement>(null)
  useEffect(() => {
    const here = pad.current
    if (here === null) return
    const hear = (event: KeyboardEvent) => {
      const target = event.target instanceof Element ? event.target : null
      if (target?.closest('input, textarea, select') || event.ctrlKey || event.metaKey) return
      const key = padKeyOf(event.key)
      if (key !== null) press(key)
    }
    here.addEventListener('keydown', hear)
    return () => here.removeEventListener('keydown', hear)
  }, [press])
  return pad
}

function padKeyOf(key: string): PadKey | null {
  if (key === ',') return '.'
  if (key === 'Backspace') return 'back'
  return /^[0-9.]$/.test(key) ? (key as PadKey) : null
}
