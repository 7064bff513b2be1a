/** Pull to move a machine, and what a pulley takes off the line (common practice; gravity of ISO 80000-3). */
const GRAVITY = 9.80665

/** Newtons along the slope: W (sin a + c cos a); mass in kilograms, slope in degrees, ground factor c. */
export function pullNewtons(massKg: number, slopeDegrees: number, groundFactor: number): number {
  const angle = (slopeDegrees * Math.PI) / 180
  return massKg * GRAVITY * (Math.sin(angle) + groundFactor * Math.cos(angle))
}

/** Newtons in the line with one moving pulley that loses this share (0 to 1) of the returning line. */
export const doubledLineNewtons = (pull: number, loss = 0.1): number => pull / (2 - loss)
