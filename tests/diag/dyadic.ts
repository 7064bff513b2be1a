// Exact arithmetic on doubles: every double is a whole number times a power of two, and so are their sums and products.

/** n * 2^e, exactly. */
export type Dyadic = { n: bigint; e: number }

export const ZERO: Dyadic = { n: 0n, e: 0 }
export const ONE: Dyadic = { n: 1n, e: 0 }

/** A finite double, to the last bit. */
export function exact(x: number): Dyadic {
  if (x === 0) return ZERO
  const bits = new DataView(new ArrayBuffer(8))
  bits.setFloat64(0, x)
  const word = bits.getBigUint64(0)
  const power = Number((word >> 52n) & 0x7ffn)
  const fraction = word & 0xfffffffffffffn
  const size = power === 0 ? fraction : fraction | (1n << 52n)
  return { n: x < 0 ? -size : size, e: (power === 0 ? 1 : power) - 1075 }
}

export function plus(a: Dyadic, b: Dyadic): Dyadic {
  const e = Math.min(a.e, b.e)
  return { n: (a.n << BigInt(a.e - e)) + (b.n << BigInt(b.e - e)), e }
}
export const times = (a: Dyadic, b: Dyadic): Dyadic => ({ n: a.n * b.n, e: a.e + b.e })
export const less = (a: Dyadic, b: Dyadic): Dyadic => plus(a, { n: -b.n, e: b.e })

/** a / b as the nearest double or so (120 bits are kept); b above 0, a not below. */
export function ratio(a: Dyadic, b: Dyadic): number {
  const shift = 120 + Math.max(0, b.n.toString(2).length - a.n.toString(2).length)
  const quotient = (a.n << BigInt(shift)) / b.n
  const bits = quotient.toString(2).length
  const drop = Math.max(0, bits - 60)
  return Number(quotient >> BigInt(drop)) * 2 ** (drop - shift + a.e - b.e)
}
