import type { Money } from '@/lib/model/money'

/** `135.00 USD`: minor units with the ISO 4217 code; two decimals, as the demo's currency has. */
export const moneyWords = ({ minor, currency }: Money): string =>
  `${(minor / 100).toFixed(2)} ${currency}`
