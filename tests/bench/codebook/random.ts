/** Where a draw by these weights falls. */
export function pick(weights: readonly number[], random: () => number): number {
  let left = random() * weights.reduce((a, b) => a + b, 0)
  for (const [i, weight] of weights.entries()) {
    left -= weight
    if (left < 0) return i
  }
  return weights.length - 1
}

/** The same things in a drawn order (Fisher and Yates). */
export function shuffled<T>(things: readonly T[], random: () => number): T[] {
  const out = [...things]
  for (let i = out.length - 1; i > 0; i--) {
    const j = Math.floor(random() * (i + 1))
    ;[out[i], out[j]] = [out[j] as T, out[i] as T]
  }
  return out
}
