/** One condition that codes report, with the codes that report it. */
export type Story = {
  id: string
  pcodes: readonly string[]
  spns: readonly number[]
  /** The failure kinds under which its SPNs tell it; null: under every kind. */
  fmis: readonly number[] | null
  of100: Readonly<Record<string, number>>
  otherwise: number
}

/** Kinds of SAE J1939-73 that say a believed reading is above or below normal, least to most severe. */
export const TOO_HIGH = [0, 15, 16] as const
export const TOO_LOW = [1, 17, 18] as const
/** As `TOO_HIGH`, and "the condition is present". */
export const PRESENT = [0, 15, 16, 31] as const
