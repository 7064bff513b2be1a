'use server'

import type { BookActions } from '@/components/desk/codebook/book-actions'
import { actorAction } from '@/lib/auth/actor-action'
import { noForm } from '@/lib/model/book-desk'
import { withdrawForm } from '@/lib/model/book-withdrawal'
import type { Actor } from '@/lib/model/person'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { publishDraft } from '@/lib/sync/server/book/publish-draft'
import { leaveDraft } from '@/lib/sync/server/book/take-draft'
import { withdraw } from '@/lib/sync/server/book/withdraw'

const handOf = (actor: Actor) => ({ actor, now: systemClock.now(), newId: uuidv7.next })

/** Publishes the draft, if the checker finds nothing wrong with it; asks for the right itself, as all here do. */
export const publish = actorAction(
  noForm,
  (actor): ReturnType<BookActions['publish']> => publishDraft(handOf(actor)),
)

/** Takes the draft away. */
export const drop = actorAction(
  noForm,
  (actor): ReturnType<BookActions['drop']> => leaveDraft(handOf(actor)),
)

/** Withdraws an item, or a whole version, for safety (R23). */
export const takeBack = actorAction(
  withdrawForm,
  (actor, form): ReturnType<BookActions['withdraw']> => withdraw(handOf(actor), form),
)
