/** Where an increasing function crosses zero between `from` and `to`: 200 halvings, right to the last digit. */
export function crossing(f: (x: number) => number, from: number, to: number): number {
  let low = from
  let high = to
  for (let i = 0; i < 200; i++) {
    const middle = (low + high) / 2
    if (f(middle) < 0) low = middle
    else high = middle
  }
  return (low + high) / 2
}
