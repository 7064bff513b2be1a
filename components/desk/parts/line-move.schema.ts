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
/** Price of one piece in minor units; up to 100,000,000 of them. */
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

/**
 * What the parts desk types into the line's two boxes; the price is of one piece, with as many decimals
 * as the shop's currency has (`places`) or none.
 */
export const lineBoxes = (places: number) =>
  z.strictObject({
    number: z.string().check(z.trim(), z.maxLength(40, 'At most 40 characters.')),
    price: z
      .string()
      .check(
        z.trim(),
        z.regex(pricePattern(places), `A price in figures, like ${priceText(13_500, places)}.`),
      ),
  })
export type LineBoxes = z.infer<ReturnType<typeof lineBoxes>>

const pricePattern = (places: number) =>
  new RegExp(places === 0 ? '^\\d{0,7}$' : `^$|^\\d{1,7}([.,]\\d{${places}})?$`)

/** The move that Enter in one of the boxes stands for: the price is what a quote has and a number has not. */
export function moveOnEnter(
  price: string,
  can: { identified: boolean; quoted: boolean },
): 'identified' | 'quoted' | null {
  if (can.quoted && (price.trim() !== '' || !can.identified)) return 'quoted'
  return can.identified ? 'identified' : null
}

/** Minor units as they are typed: `135.00`. */
export const priceText = (minor: number, places: number): string =>
  (minor / 10 ** places).toFixed(places)

/** `135.00` or `135,00` or `135` in minor units; null for nothing typed. Only what `lineBoxes` takes. */
export function minorOf(price: string, places: number): number | null {
  if (price === '') return null
  const [whole = '0', part = ''] = price.replace(',', '.').split('.')
  return Number(whole) * 10 ** places + Number(part.padEnd(places, '0') || 0)
}
