'use server'

import type { MoveLineAction } from '@/components/desk/desk-actions'
import { lineMoveForm } from '@/components/desk/parts/line-move.schema'
import { changePartLine } from '@/db/queries/desk-writes'
import { actorAction } from '@/lib/auth/actor-action'
import { fail } from '@/lib/model/result'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { moveLine } from '@/lib/shop/desk-moves'
import { may } from '@/lib/shop/permissions'

type Answer = ReturnType<MoveLineAction>

/** Moves a part line to identified, quoted or cancelled (rule R14); a quote is in the shop's currency. */
export const movePartLine = actorAction(lineMoveForm, (actor, input): Answer => {
  if (!may(actor.roles, 'part.work')) return Promise.resolve(fail({ kind: 'forbidden' }))
  const { requestId, lineId } = input
  const stamp = { auditId: uuidv7.next(), at: new Date(systemClock.now()).toISOString() }
  return changePartLine(actor, { requestId, lineId, stamp }, (line, shop) =>
    moveLine(
      line,
      input.to === 'quoted'
        ? { ...input, price: { minor: input.priceMinor, currency: shop.currency } }
        : input,
    ),
  )
})
