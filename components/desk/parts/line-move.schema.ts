import * as z from 'zod/mini'
import { id } from '@/lib/model/id'
import { partLineState } from '@/lib/model/part-request'

const head = { requestId: id, lineId: id, from: partLineState }
const partNumber = z
  .string()
  .check(
    z.trim(),
    z.minLength(1, 'Type the part number.'),
    z.maxLength(40, 'At most 40 characters.'),
  )
/** Price of one piece in minor units; up to 1,000,000.00 of the shop's currency. */
const priceMinor = z.int().check(z.minimum(0), z.maximum(100_000_000))

/** A move of one part line by the parts desk. `from` is the state the screen showed. */
export const lineMoveForm = z.discriminatedUnion('to', [
  z.strictObject({ ...head, to: z.literal('identified'), number: partNumber }),
  z.strictObject({
    ...head,
    to: z.literal('quoted'),
    number: z.nullable(partNumber),
    priceMinor,
  }),
  z.strictObject({ ...head, to: z.literal('cancelled') }),
])
export type LineMoveForm = z.infer<typeof lineMoveForm>

/** What the parts desk types into the line's two boxes; the price is of one piece. */
export const lineBoxes = z.strictObject({
  number: z.string().check(z.trim(), z.maxLength(40, 'At most 40 characters.')),
  price: z
    .string()
    .check(
      z.trim(),
      z.regex(/^$|^\d{1,7}([.,]\d{2})?$/, 'A price in figures, like 135.00, or nothing.'),
    ),
})
export type LineBoxes = z.infer<typeof lineBoxes>

/** `135.00` or `135,00` or `135` in minor units; null for nothing typed. Only what `lineBoxes` takes. */
export function minorOf(price: string): number | null {
  if (price === '') return null
  const [whole = '0', cents = '00'] = price.replace(',', '.').split('.')
  return Number(whole) * 100 + Number(cents)
}
