import type { ShopLine } from '@/lib/ports/shop-line'

/** `fieldOpen`: the session has ended, but this browser's field still opens for the person. */
export type Ended = 'out' | 'notSignedOut' | 'fieldOpen'

type Here = {
  line: Pick<ShopLine, 'signOut'>
  /** Closes the field on this browser (SO4); rejects when its store does not answer. */
  lock(): Promise<void>
}

/** Closes the field on this browser. Fetched only now: sign-in page and desk need no database of their own. */
export async function lockHere(): Promise<void> {
  const { lockField } = await import('@/lib/sync/client/emptied')
  await lockField()
}

/**
 * Closes the field, then ends the session: in this order nobody is told "signed out" of a field that is
 * still open. A session that cannot be ended opens the field again, so nothing is lost by the order.
 */
export async function endHere({ line, lock }: Here): Promise<Ended> {
  const isLocked = await lock().then(
    () => true,
    () => false,
  )
  const answer = await line.signOut()
  if (!answer.ok) return 'notSignedOut'
  return isLocked ? 'out' : 'fieldOpen'
}
