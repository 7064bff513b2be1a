/**
 * What would let a reading decide: the same figure reckoned for other set-ups, at a part in the middle of
 * its limits, against the u that reaches 95 % (facts of JCGM 106; the field four-wire figures are those of a
 * common workshop meter: volts 0.5 % + 2 steps of 1 mV, amperes 1 % + 3 steps of 1 mA, common practice).
 */
import { ONE_SIDED_95, TWO_SIDED_95 } from './normal'
import { budgetOf, kelvinsOutside, limitsOf, type ReadingInput } from './reading-budget'

/** One way to a reading that would decide. */
export type Advice = {
  way: 'nullLeads' | 'finerRange' | 'fourWire' | 'warmMeter' | 'swap'
  /** u of that set-up in the figure's unit; null where it is no measurement. */
  standardU: number | null
  reaches95: boolean
  words: string
}

/** Above this a 12 V battery with a lamp in series does not drive 1 A, and a sensor would not bear it (common practice). */
const FOUR_WIRE_OHM = 5

/** A number as the screens print it: three places below 10, fewer above, never in exponents. */
export function figure(value: number): string {
  const size = Math.abs(value)
  return value.toFixed(size < 10 ? 3 : size < 100 ? 2 : 1)
}

/** The ways that apply to this reading, those that reach 95 % first, in a fixed order otherwise. */
export function adviceFor(input: ReadingInput): Advice[] {
  const middle = nominalOf(input)
  if (middle === null) return []
  const resistance = input.quantity === 'resistance'
  const all = [
    kelvinsOutside(input.meterTempC) > 0 ? warmMeter(input, middle) : null,
    resistance && !input.nulled ? nullLeads(input, middle) : null,
    resistance && middle <= FOUR_WIRE_OHM ? fourWire(input, middle) : null,
    resistance ? swap() : null,
    resistance ? finerRange(input, middle) : null,
  ].filter((a) => a !== null)
  return [...all.filter((a) => a.reaches95), ...all.filter((a) => !a.reaches95)]
}

/** u of a four-wire reading in the field: `amperes` through the part, volts at its own pins (JCGM 100 5.1.6). */
export function fourWireU(ohm: number, amperes = 1): number {
  const volts = ohm * amperes
  if (volts <= 0) return 0
  const voltShare = (0.005 * volts + 2 * 0.001) / volts
  const ampereShare = (0.01 * amperes + 3 * 0.001) / amperes
  return ohm * Math.sqrt((voltShare ** 2 + ampereShare ** 2) / 3)
}

function nominalOf({ spec }: ReadingInput): number | null {
  const limits = limitsOf(spec)
  if (limits === null) return null
  if (spec?.nominal !== null && spec?.nominal !== undefined) return spec.nominal
  if (limits.low !== null && limits.high !== null) return (limits.low + limits.high) / 2
  return limits.low ?? limits.high
}

function reaches(input: ReadingInput, standardU: number): boolean {
  const limits = limitsOf(input.spec)
  if (limits === null) return false
  if (limits.low !== null && limits.high !== null)
    return standardU <= (limits.high - limits.low) / 2 / TWO_SIDED_95
  const only = limits.low ?? limits.high ?? 0
  const estimate = input.spec?.nominal ?? budgetOf(input).estimate
  return standardU <= Math.abs(estimate - only) / ONE_SIDED_95
}

const measured = (
  input: ReadingInput,
  { way, standardU, words }: Omit<Advice, 'reaches95'> & { standardU: number },
): Advice => ({ way, standardU, reaches95: reaches(input, standardU), words })

function warmMeter(input: ReadingInput, middle: number): Advice {
  const leads = budgetOf({ ...input, value: 0 }).estimate
  const { standardU } = budgetOf({ ...input, value: middle - leads, meterTempC: 20 })
  const words = `Warm the meter inside your jacket to 18 C or more: u falls to ${figure(standardU)}.`
  return measured(input, { way: 'warmMeter', standardU, words })
}

function nullLeads(input: ReadingInput, middle: number): Advice {
  const nulled = { ...input, value: middle, nulled: true }
  const { standardU } = budgetOf(nulled)
  const best = budgetOf({ ...nulled, nullCancels: true }).standardU
  const says = reaches(input, standardU) ? 'that decides' : 'that alone does not reach 95 %'
  const words = `Null the leads: u becomes ${figure(standardU)} (at the very best ${figure(best)}); ${says}.`
  return measured(input, { way: 'nullLeads', standardU, words })
}

function finerRange(input: ReadingInput, middle: number): Advice {
  const resolution = input.meterFunction.resolution / 10
  const { standardU } = budgetOf({
    ...input,
    value: middle,
    nulled: true,
    meterFunction: { ...input.meterFunction, resolution },
    extra: [...(input.extra ?? []), { source: 'Null left over', halfWidth: resolution }],
  })
  const words = `A range with ${Number(resolution.toPrecision(3))} ${input.spec?.unit ?? ''} steps, if the meter has one, and the leads nulled: u ${figure(standardU)}.`
  return measured(input, { way: 'finerRange', standardU, words })
}

function fourWire(input: ReadingInput, middle: number): Advice {
  const standardU = fourWireU(middle)
  const words = `Four-wire: 1 A through the part with a lamp in series, volts at its own pins: u ${figure(standardU)}.`
  return measured(input, { way: 'fourWire', standardU, words })
}

const swap = (): Advice => ({
  way: 'swap',
  standardU: null,
  reaches95: true,
  words:
    'Swap with a known-good part, then refit the old one: it decides about the part without a meter.',
})
