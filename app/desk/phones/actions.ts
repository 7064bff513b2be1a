'use server'

import type { DecideAction, RevokeAction } from '@/components/desk/phones/phone-actions'
import { actorAction } from '@/lib/auth/actor-action'
import { decideForm, revokeForm } from '@/lib/model/phones'
import { fail } from '@/lib/model/result'
import { systemClock } from '@/lib/ports/clock'
import { shopFiles } from '@/lib/ports/files'
import { uuidv7 } from '@/lib/ports/ids'
import { may } from '@/lib/shop/permissions'
import { decide } from '@/lib/sync/server/quarantine-form'
import { revokePhone } from '@/lib/sync/server/revoke'

/** Takes a phone out for good (Q1). */
export const takeOut = actorAction(revokeForm, (actor, form): ReturnType<RevokeAction> => {
  if (!may(actor.roles, 'device.revoke')) return Promise.resolve(fail({ kind: 'forbidden' }))
  return revokePhone(actor, form, { now: systemClock.now(), newId: uuidv7.next })
})

/** Accepts or refuses what a phone left in quarantine (Q5, Q6). */
export const decideOn = actorAction(decideForm, (actor, form): ReturnType<DecideAction> => {
  if (!may(actor.roles, 'device.revoke')) return Promise.resolve(fail({ kind: 'forbidden' }))
  const with_ = { files: shopFiles(), now: systemClock.now(), newId: uuidv7.next }
  return decide(actor, form, with_)
})
