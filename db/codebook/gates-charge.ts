import type { Gate } from '@/lib/model/features'

/** The groups of machines this chapter speaks of. */
export const WITH_BATTERY: Gate = { battery: ['yes'] }
/** Coolant in it, whatever takes the heat away. */
export const COOLANT: Gate = { cooling: ['liquid', 'snow'] }
export const RADIATOR: Gate = { cooling: ['liquid'] }
/** A radiator with an electric fan. */
export const RADIATOR_FAN: Gate = { cooling: ['liquid'], battery: ['yes'] }
export const SNOW: Gate = { cooling: ['snow'] }
export const AIR: Gate = { cooling: ['air'] }
/** A snowmobile cooled by a belt-driven fan. */
export const FAN_SLED: Gate = { cooling: ['air'], kind: ['snowmobile'] }
