import type { Money } from '@/lib/model/money'
import { fail, type Result } from '@/lib/model/result'

/** A card payment to start: what for, how much, and where the payer comes back to. */
type PaymentOrder = { id: string; amount: Money; words: string; returnUrl: string }

/** Where the payer goes to pay. */
type PaymentStart = { providerId: string; url: string }

/** `notSetUp`: the shop has no payment provider, so nothing was started and nothing charged. */
type PaymentProblem = { kind: 'notSetUp' }

export type Payment = { start(order: PaymentOrder): Promise<Result<PaymentStart, PaymentProblem>> }

/** The payments of a shop without a provider: every order is refused plainly. */
export const noPayment: Payment = {
  start: () => Promise.resolve(fail({ kind: 'notSetUp' })),
}
