import { applyAnswer } from './answer'
import type { Core } from './core'
import { isFull, withRoom } from './free-room'
import { type Answered, type Applied, applyOutcomes } from './outcomes'
import { settleRows } from './settle-rows'

/**
 * Applies what the shop answered; when the phone has no room, frees some and tries once more. Without
 * room even then the page is left for later (P21): the cursor stays, so that no row is missed, but what
 * became of the sent ops is kept, so that sending goes on.
 */
export async function keepAnswer(core: Core, answered: Answered): Promise<Applied> {
  try {
    return await withRoom(core, () => applyAnswer(core, answered))
  } catch (cause) {
    if (!isFull(cause)) throw cause
    await applyOutcomes(core, answered)
    await settleRows(core).catch(() => undefined)
    return { more: false, bookChanged: false, wasReset: false, noRoom: true }
  }
}
