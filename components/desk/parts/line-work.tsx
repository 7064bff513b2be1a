'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import type { FormEvent, KeyboardEvent } from 'react'
import { type Control, Controller, useForm } from 'react-hook-form'
import { Field } from '@/components/ui/field'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import type { PartLine, PartLineState } from '@/lib/model/part-request'
import { currencyPlaces } from '@/lib/shop/currency'
import { mayMove } from '@/lib/shop/job-states'
import { LINE_STATE_WORDS } from '@/lib/shop/part-words'
import type { MoveLineAction } from '../desk-actions'
import { useDesk } from '../desk-context'
import { useActing } from '../use-acting'
import {
  type LineBoxes,
  type LineMoveForm,
  lineBoxes,
  minorOf,
  moveOnEnter,
  priceText,
} from './line-move.schema'

type Line = PartLine & { state: PartLineState }
type Props = { requestId: string; line: Line; move: MoveLineAction }

const boxesOf = ({ number, price }: Line): LineBoxes => ({
  number: number ?? '',
  price: price ? priceText(price.minor, currencyPlaces(price.currency)) : '',
})

/** Number and price of a line, and the keys that move it on: only moves its state allows are shown. */
export function LineWork({ requestId, line, move }: Props) {
  const { shop } = useDesk()
  const places = currencyPlaces(shop.currency)
  const { busy, refusal, act } = useActing()
  const form = useForm<LineBoxes>({
    resolver: zodResolver(lineBoxes(places)),
    values: boxesOf(line),
  })
  const { control, handleSubmit, setError, getValues } = form
  const head = { requestId, lineId: line.id, from: line.state }
  const can = (to: PartLineState) => mayMove('partLine', line.state, to)
  const send = (wanted: LineMoveForm) =>
    void act(() => move(wanted), `${line.words}: ${LINE_STATE_WORDS[wanted.to].toLowerCase()}.`)

  const identify = handleSubmit(({ number }) => {
    if (number === '') return setError('number', { message: 'Type the part number.' })
    send({ ...head, to: 'identified', number })
  })
  const quote = handleSubmit(({ number, price }) => {
    const priceMinor = minorOf(price, places)
    if (priceMinor === null) return setError('price', { message: 'Type the price of one piece.' })
    send({ ...head, to: 'quoted', number: number === '' ? null : number, priceMinor })
  })
  const open = can('identified') || can('quoted')
  function onEnter(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    const moves = { identified: can('identified'), quoted: can('quoted') }
    const to = busy ? null : moveOnEnter(getValues('price'), moves)
    if (to !== null) void (to === 'quoted' ? quote : identify)(event)
  }
  if (!open && !can('cancelled'))
    return <p className="text-second">Nothing to do on this line at the desk yet.</p>
  return (
    <form className="grid gap-3" onSubmit={onEnter} onKeyDown={submitOnEnter}>
      {open ? (
        <div className="desk-boxes">
          <Box control={control} name="number" label="Part number" />
          <Box control={control} name="price" label={`Price of one, ${shop.currency}`} />
        </div>
      ) : null}
      <div className="flex flex-wrap gap-2">
        {can('identified') ? (
          <Key small={true} disabled={busy} onClick={(event) => void identify(event)}>
            Identified
          </Key>
        ) : null}
        {can('quoted') ? (
          <Key small={true} kind="plate" disabled={busy} onClick={(event) => void quote(event)}>
            Quoted
          </Key>
        ) : null}
      </div>
      {refusal ? <p className="font-bold text-nogo">{refusal}</p> : null}
      {can('cancelled') ? (
        <div className="max-w-80">
          <Hold
            label="Cancel the line"
            question={`Cancel ${line.words}?`}
            confirmLabel="Cancel it"
            disabled={busy}
            onConfirm={() => send({ ...head, to: 'cancelled' })}
          />
        </div>
      ) : null}
    </form>
  )
}

/** A form of several boxes whose keys do different things is submitted by no browser of itself. */
function submitOnEnter(event: KeyboardEvent<HTMLFormElement>) {
  if (event.key !== 'Enter' || !(event.target instanceof HTMLInputElement)) return
  event.preventDefault()
  event.currentTarget.requestSubmit()
}

type BoxProps = { control: Control<LineBoxes>; name: keyof LineBoxes; label: string }

function Box({ control, name, label }: BoxProps) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Field
          label={label}
          figures={true}
          name={name}
          inputMode={name === 'price' ? 'decimal' : 'text'}
          maxLength={40}
          value={field.value}
          onChange={field.onChange}
          error={fieldState.error?.message ?? null}
        />
      )}
    />
  )
}
