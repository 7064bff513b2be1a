import type { Gate } from '@/lib/model/features'

/** The groups of machines this chapter speaks of. */
export const BELT: Gate = { drive: ['belt'] }
export const CHAIN: Gate = { drive: ['chain'] }
/** A gearbox behind a wet clutch, by hand lever or by itself. */
export const GEARED: Gate = { drive: ['chain', 'shaft'] }
export const FOUR_WHEELS: Gate = { kind: ['atv', 'sideBySide'] }
export const SLED: Gate = { kind: ['snowmobile'] }
export const BIKE: Gate = { kind: ['dirtBike'] }
export const WHEELED: Gate = { kind: ['atv', 'sideBySide', 'dirtBike'] }
/** Two wheels or two skis in front, joined by rods. */
export const TWO_FRONT: Gate = { kind: ['atv', 'sideBySide', 'snowmobile'] }
/** Everything that is ridden or driven. */
export const RIDDEN: Gate = { kind: ['atv', 'sideBySide', 'snowmobile', 'dirtBike'] }
export const WITH_NEUTRAL: Gate = { neutral: ['yes'] }
