import type { PartLine, PartLineState, PartRequest } from '@/lib/model/part-request'

/** Where a part line stands, in one word; on the phone, at the desk and in letters (rule R14). */
export const LINE_STATE_WORDS: Record<PartLineState, string> = {
  asked: 'Asked',
  identified: 'Identified',
  quoted: 'Quoted',
  ordered: 'Ordered',
  promised: 'Promised',
  received: 'Received',
  allocated: 'Allocated',
  dispatched: 'Dispatched',
  fitted: 'Fitted',
  returned: 'Returned',
  credited: 'Credited',
  cancelled: 'Cancelled',
}

/** When a part is needed. */
export const URGENCY_WORDS: Record<PartRequest['urgency'], string> = {
  now: 'Now',
  today: 'Today',
  thisWeek: 'This week',
}

/** Which make of the part is wanted. */
export const CHOICE_WORDS: Record<PartLine['choice'], string> = {
  genuine: 'Genuine',
  aftermarket: 'Aftermarket',
  either: 'Either',
}

/** A share (0 to 1) of 100 with one decimal, or none when it is whole: `38.7`, `4`. */
export const shareOf100 = (share: number): string => (share * 100).toFixed(1).replace(/\.0$/, '')

/** From which failure chance of the aftermarket part on it is not worth it; `breakEven` 0 to 1. */
export const breakEvenWords = (breakEven: number): string =>
  `Break-even: the aftermarket part pays until ${shareOf100(breakEven)} of 100 fail.`

/** What the shop knows of the aftermarket part's failures (0 to 1); null: nothing. */
export const aftermarketWords = (fails: number | null): string =>
  fails === null
    ? 'The shop has no failure figure for the aftermarket part.'
    : `Aftermarket fails ${shareOf100(fails)} of 100.`
