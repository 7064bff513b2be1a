import type { PartLine, PartLineState, PartRequest } from '@/lib/model/part-request'

/** Words of parts asked for, on the phone and at the desk (rule R14). */
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

export const URGENCY_WORDS: Record<PartRequest['urgency'], string> = {
  now: 'Now',
  today: 'Today',
  thisWeek: 'This week',
}

export const CHOICE_WORDS: Record<PartLine['choice'], string> = {
  genuine: 'Genuine',
  aftermarket: 'Aftermarket',
  either: 'Either',
}
