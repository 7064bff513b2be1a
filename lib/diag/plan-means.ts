import type { Bag } from '@/lib/model/bag'
import type { CheckItem, FaultItem, SwapItem } from '@/lib/model/code-book'
import { allows } from '@/lib/model/engine-state'
import type { Role } from '@/lib/model/role'
import type { Shop } from '@/lib/model/shop'
import { type BookIndex, wordName } from './book-index'

/** What the plan may count on. `bag` null: not known, nothing is left out for tools or parts. */
export type Means = {
  bag: Bag | null
  roles: Role[]
  /** Minutes to the leave-by time (rule R6); null: no limit. */
  minutesToLeaveBy: number | null
  shop: Pick<Shop, 'perMinuteMinor' | 'towMinor' | 'recoveryMinor'>
  dark: boolean
  people: 1 | 2
  /** Air at the machine in C; null or left out where nobody said it. */
  airTempC?: number | null
}

/** What kind of step it is that is left out. */
export type Kind = 'check' | 'swap' | 'repair' | 'stop'
/** Something that cannot be done now, with the reason as a sentence. */
export type LeftOut = { id: string; kind: Kind; reason: string }

/** After dusk minutes grow by this factor (rule R6; common practice, no source). */
export const DARK_FACTOR = 1.3

/** Below this air temperature in C work is done in gloves (rule R6). */
export const GLOVES_BELOW_C = -5
/** In gloves minutes grow by this factor (rule R6; common practice, no source). */
export const GLOVE_FACTOR = 1.5

/** Minutes of work, from 0, as they will be taken here: longer in the dark and in gloves, and by both where both hold. */
export function minutesHere(minutes: number, { dark, airTempC = null }: Means): number {
  const gloves = airTempC !== null && airTempC < GLOVES_BELOW_C
  return minutes * (dark ? DARK_FACTOR : 1) * (gloves ? GLOVE_FACTOR : 1)
}

/** Why a check cannot be done on a machine with this complaint, in a sentence; null when it can. */
export function whyNotNow(
  { index, symptom }: { index: BookIndex; symptom: string | null },
  check: CheckItem,
): string | null {
  const engine = index.symptoms.get(symptom ?? '')?.engine ?? 'runs'
  return allows(engine, check.machineState)
    ? null
    : engine === 'still'
      ? 'Not while the engine must not or cannot turn.'
      : 'Not while the engine does not run.'
}

/** Why a check cannot be done with these means, in a sentence; null when it can. */
export function whyNotCheck(index: BookIndex, check: CheckItem, means: Means): string | null {
  if (!check.roles.some((role) => means.roles.includes(role)))
    return `For ${check.roles.join(' or ')} only.`
  if (!check.guideSafe && means.roles.every((role) => role === 'guide'))
    return 'Not marked safe for guides.'
  if (check.people > means.people && check.onePersonWay === null) return 'Needs two people.'
  if (check.light === 'daylight' && means.dark) return 'Needs daylight.'
  return missingTools(
    index,
    check.tools.map((t) => t.tool),
    means,
  )
}

/** Why a swap cannot be done with these means; null when it can. */
export function whyNotSwap(index: BookIndex, swap: SwapItem, means: Means): string | null {
  if (!swap.guideSafe && !means.roles.includes('mechanic')) return 'For mechanics only.'
  if (means.bag === null) return null
  const name = wordName(index, 'part', swap.part).toLowerCase()
  const held = means.bag.parts.filter((p) => p.part === swap.part && p.quantity > 0)
  if (held.length === 0) return `No ${name} in the bag.`
  return held.some((p) => p.knownGood) ? null : `The ${name} in the bag is not known to be good.`
}

/** Why a fault cannot be repaired here; null when it can. */
export function whyNotRepair(index: BookIndex, fault: FaultItem, means: Means): string | null {
  const { repair } = fault
  if (repair === null) return 'Not repaired in the field.'
  if (!means.roles.includes('mechanic')) return 'For mechanics only.'
  if (repair.part === null || isHeld(repair.part, means) || repair.withoutPartOf100 !== undefined)
    return null
  return `No ${wordName(index, 'part', repair.part).toLowerCase()} in the bag.`
}

/** Whether a part is in the bag; everything is where nobody counted one. */
export const isHeld = (part: string, { bag }: Means): boolean =>
  bag === null || bag.parts.some((p) => p.part === part && p.quantity > 0)

function missingTools(index: BookIndex, tools: readonly string[], { bag }: Means): string | null {
  if (bag === null) return null
  const missing = tools.filter((tool) => !bag.tools.includes(tool))
  if (missing.length === 0) return null
  const names = missing.map((tool) => wordName(index, 'tool', tool).toLowerCase())
  return `Not in the bag: ${names.join(', ')}.`
}
