import type { PartLine, PartLineState, PartRequest } from '@/lib/model/part-request'

export const LINE_STATE_WORDS: Record<PartLineState, string> = {
  asked: 'Asked',
  identified: 'Found out',
  quoted: 'Quoted',
  ordered: 'Ordered',
  promised: 'Promised',
  received: 'Received',
  allocated: 'Set aside',
  dispatched: 'On its way',
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
