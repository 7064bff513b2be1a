'use client'
import type { Quantity } from '@/lib/model/meter-profile'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import type { MeterSetup, MeterView } from './meter-setup'

type Props = { view: MeterView; quantity: Quantity; airTempC: number | null }

/** Which meter, leads nulled or not, and the two temperatures (rule R7). Nothing is assumed unsaid. */
export function MeterSetupForm({ view, quantity, airTempC }: Props) {
  const { setup, change, meter, meters } = view
  return (
    <div className="grid gap-4">
      {meters.length > 1 && (
        <Choice
          legend="Meter"
          value={meter?.id ?? null}
          onChange={(meterId) => change({ ...setup, meterId })}
          options={meters.map((one) => ({ value: one.id, label: one.name }))}
        />
      )}
      {meter !== null && <Accuracy view={view} quantity={quantity} />}
      {quantity === 'resistance' && (
        <Choice
          legend="Test leads"
          hint="Nulled: probes held together and set to zero just now."
          columns={2}
          value={setup.nulled ? 'nulled' : 'not'}
          onChange={(next) => change({ ...setup, nulled: next === 'nulled' })}
          options={[
            { value: 'not', label: 'Not nulled' },
            { value: 'nulled', label: 'Nulled' },
          ]}
        />
      )}
      <Temperatures setup={setup} change={change} airTempC={airTempC} />
    </div>
  )
}

function Accuracy({ view, quantity }: Omit<Props, 'airTempC'>) {
  const { meter } = view
  const fn = meter?.functions[quantity]
  if (meter === null) return null
  if (fn === undefined)
    return <p className="font-bold">{meter.name} does not read this. Pick another meter.</p>
  return (
    <p className="text-second text-ink2">
      {meter.name}: ±({fn.percent} % + {fn.digits} digits), steps of {fn.resolution}
      {quantity === 'resistance'
        ? `, leads ${meter.leadsOhm.low} to ${meter.leadsOhm.high} ohm`
        : ''}
      . Source: {meter.source}.
    </p>
  )
}

function Temperatures({
  setup,
  change,
  airTempC,
}: {
  setup: MeterSetup
  change: (next: MeterSetup) => void
  airTempC: number | null
}) {
  const both = setup.partTempC === 20 && setup.meterTempC === 20
  return (
    <div className="grid gap-2">
      <p className="font-bold">Temperatures</p>
      <Key
        small
        quiet
        aria-pressed={both}
        className={both ? 'key-down' : ''}
        onClick={() =>
          change({ ...setup, partTempC: 20, meterTempC: 20, partTyped: null, meterTyped: null })
        }
      >
        Part and meter are both at about 20 °C
      </Key>
      <div className="grid grid-cols-2 gap-2">
        <Degrees
          label="Part, °C"
          value={setup.partTempC}
          typed={setup.partTyped ?? null}
          onChange={(partTempC, partTyped) => change({ ...setup, partTempC, partTyped })}
        />
        <Degrees
          label="Meter, °C"
          value={setup.meterTempC}
          typed={setup.meterTyped ?? null}
          onChange={(meterTempC, meterTyped) => change({ ...setup, meterTempC, meterTyped })}
        />
      </div>
      <p className="text-second text-ink2">
        Left empty, a copper part counts as 20 °C give or take 20 K (practice), and the meter as
        within 18 to 28 °C.
        {airTempC === null ? '' : ` The air was ${airTempC} °C when the job was opened.`}
      </p>
    </div>
  )
}

/** A temperature as typed; empty means "not known". */
function Degrees(props: {
  label: string
  value: number | null
  /** What stands in the field while it is no figure yet; kept with the draft to the keystroke (R8). */
  typed: string | null
  onChange: (next: number | null, typed: string | null) => void
}) {
  const shown = props.typed ?? (props.value === null ? '' : String(props.value))
  const error = shown.trim() === '' || readDegrees(shown) !== null ? null : 'From −60 to 200.'
  return (
    <Field
      label={props.label}
      figures
      inputMode="text"
      value={shown}
      error={error}
      onChange={(next) => {
        const read = readDegrees(next)
        const settled = next.trim() === '' || read !== null
        const typed = settled && String(read ?? '') === next ? null : next
        props.onChange(settled ? read : props.value, typed)
      }}
    />
  )
}

/** Degrees as people type them: `-15`, `−15`, `20,5`; null when it is not one from -60 to 200. */
export function readDegrees(typed: string): number | null {
  const text = typed.trim().replace('−', '-').replace(',', '.')
  if (!/^-?\d{1,3}(\.\d)?$/.test(text)) return null
  const value = Number(text)
  return value >= -60 && value <= 200 ? value : null
}
