/** Current and energy of an ignition coil's primary by time on (dwell), for inductive coils. */

export type Primary = { ohm: number; henry: number }

/** Amperes after a dwell in seconds at these volts: V/R (1 - e^(-tR/L)). */
export const primaryAmperes = ({ ohm, henry }: Primary, volts: number, dwellS: number): number =>
  (volts / ohm) * -Math.expm1((-dwellS * ohm) / henry)

/** Seconds to reach a current; infinite when the volts cannot drive it. */
export function secondsTo({ ohm, henry }: Primary, volts: number, amperes: number): number {
  const share = (amperes * ohm) / volts
  return share >= 1 ? Number.POSITIVE_INFINITY : (-henry / ohm) * Math.log1p(-share)
}

/** Joules stored at a current: L I^2 / 2. */
export const storedJoules = (henry: number, amperes: number): number => (henry * amperes ** 2) / 2
