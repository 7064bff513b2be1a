import { fixed } from './figures'

/**
 * The axis of a reading strip. Choice: the band takes 55 of 100 of the width when the value is
 * near it; a value or an I-beam outside widens the axis on that side only, so that the picture
 * never lies about how far off it is. Steps are 1, 2, 2.5 or 5 times a power of ten.
 */
export type Limits = { low: number | null; high: number | null }
export type AxisInput = {
  value: number
  halfWidth: number
  limits: Limits | null
  /** The quantity cannot be under zero (a resistance): the axis then does not go there. */
  neverNegative: boolean
}
type Tick = { at: number; kind: 'long' | 'mid' | 'short'; label: string | null }
export type Axis = { from: number; to: number; step: number; ticks: Tick[] }

const BAND_SHARE = 0.55
const EDGE_SHARE = 0.05

/** The axis for one reading: range, label step and ticks of three lengths. */
export function stripAxis(input: AxisInput, labelsWanted = 5): Axis {
  let [from, to] = around(input)
  const room = EDGE_SHARE * (to - from)
  const low = input.value - input.halfWidth
  const high = input.value + input.halfWidth
  if (low - room < from) from = low - 1.6 * room
  if (high + room > to) to = high + 1.6 * room
  if (input.neverNegative && from < 0) from = 0
  if (to <= from) to = from + 1
  const step = niceStep((to - from) / labelsWanted)
  return { from, to, step, ticks: ticksBetween(from, to, step) }
}

function around({ value, halfWidth, limits }: AxisInput): [number, number] {
  const low = limits?.low ?? null
  const high = limits?.high ?? null
  if (low !== null && high !== null && high > low) {
    const rest = ((high - low) / BAND_SHARE - (high - low)) / 2
    return [low - rest, high + rest]
  }
  const one = low ?? high
  if (one === null) {
    const half = Math.max(4 * halfWidth, Math.abs(value) * 0.1, 1e-6)
    return [value - half, value + half]
  }
  const whole = Math.max(6 * halfWidth, 2.6 * Math.abs(value - one), Math.abs(one) * 0.04, 1e-6)
  const open = BAND_SHARE * whole
  return low === null ? [one - open, one + whole - open] : [one - whole + open, one + open]
}

/** The smallest of 1, 2, 2.5, 5 times a power of ten that is at least `rough`. */
export function niceStep(rough: number): number {
  const power = 10 ** Math.floor(Math.log10(rough))
  for (const factor of [1, 2, 2.5, 5]) {
    if (factor * power >= rough * (1 - 1e-9)) return factor * power
  }
  return 10 * power
}

function ticksBetween(from: number, to: number, step: number): Tick[] {
  const fine = step / partsOf(step)
  const ticks: Tick[] = []
  for (let i = Math.ceil(from / fine - 1e-9); i * fine <= to + fine * 1e-9; i++) {
    const at = i * fine
    const long = isWhole(at / step)
    const mid = !long && isWhole((2 * at) / step)
    const kind = long ? 'long' : mid ? 'mid' : 'short'
    ticks.push({ at, kind, label: long ? label(at, step) : null })
  }
  return ticks
}

/** The leading figure of a nice step: 1, 2, 2.5 or 5. */
const leadOf = (step: number): number =>
  Math.round((step / 10 ** Math.floor(Math.log10(step) + 1e-9)) * 10) / 10
const partsOf = (step: number): number => ({ 1: 10, 2: 4 })[leadOf(step)] ?? 5
const isWhole = (x: number): boolean => Math.abs(x - Math.round(x)) < 1e-6

function label(value: number, step: number): string {
  const tens = Math.max(0, -Math.floor(Math.log10(step) + 1e-9))
  const places = tens + (leadOf(step) === 2.5 ? 1 : 0)
  return fixed(Math.abs(value) < step * 1e-6 ? 0 : value, places)
}

/** Where a value lies on a strip of `width` pixels, kept on the strip. */
export const xOf = (axis: Axis, value: number, width: number): number =>
  Math.min(width, Math.max(0, ((value - axis.from) / (axis.to - axis.from)) * width))

/** Parts of the I-beam: `solid` inside the limits, `hollow` beyond one. Never under `minPx` wide. */
export function beamParts(
  axis: Axis,
  input: Omit<AxisInput, 'neverNegative'>,
  box: { width: number; minPx: number },
): { from: number; to: number; hollow: boolean }[] {
  const mid = xOf(axis, input.value, box.width)
  let left = xOf(axis, input.value - input.halfWidth, box.width)
  let right = xOf(axis, input.value + input.halfWidth, box.width)
  if (right - left < box.minPx) {
    left = mid - box.minPx / 2
    right = mid + box.minPx / 2
  }
  const cuts = [input.limits?.low ?? null, input.limits?.high ?? null]
    .filter((limit): limit is number => limit !== null)
    .filter((limit) => Math.abs(limit - input.value) < input.halfWidth)
    .map((limit) => xOf(axis, limit, box.width))
    .filter((x) => x > left && x < right)
  if (cuts.length === 0) return [{ from: left, to: right, hollow: false }]
  const edges = [left, ...cuts, right]
  return edges.slice(1).map((to, i) => {
    const from = edges[i] ?? left
    const at = axis.from + ((from + to) / 2 / box.width) * (axis.to - axis.from)
    return { from, to, hollow: !within(at, input.limits) }
  })
}

function within(value: number, limits: Limits | null): boolean {
  if (limits?.low !== null && limits?.low !== undefined && value < limits.low) return false
  return !(limits?.high !== null && limits?.high !== undefined && value > limits.high)
}
