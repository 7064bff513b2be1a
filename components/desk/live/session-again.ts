import type { ShopLine } from '@/lib/ports/shop-line'

/** Whose session it is: this person's, or gone (nobody's or another's); `unknown`: the shop cannot be asked. */
export type Session = 'mine' | 'gone' | 'unknown'

/** What asking needs of a tab's surroundings. */
export type Asked = {
  line: Pick<ShopLine, 'getJson'>
  /** True when what `/api/me` answered is the person this desk was opened for. */
  isMe(answer: unknown): boolean
  /** Calls `look` whenever somebody looks at this tab again; the answer stops it. */
  onLook(look: () => void): () => void
}

/**
 * Asks the shop whose session it is. A tab that is signed out (`isOut`) asks once more whenever somebody
 * looks at it or another tab speaks, and goes `back` to work when the session is its person's again.
 */
export function sessionAgain(
  { line, isMe, onLook }: Asked,
  tab: { isOut(): boolean; back(): void },
) {
  let asking = false
  let stopped = false

  async function ask(): Promise<Session> {
    const me = await line.getJson('/api/me')
    if (me.ok) return isMe(me.value) ? 'mine' : 'gone'
    return me.problem.kind === 'signedOut' ? 'gone' : 'unknown'
  }
  async function again() {
    if (asking || !tab.isOut()) return
    asking = true
    const found = await ask()
    asking = false
    if (!stopped && found === 'mine') tab.back()
  }

  const stopLooking = onLook(() => void again())
  return {
    ask,
    askAgain: () => void again(),
    stop() {
      stopped = true
      stopLooking()
    },
  }
}
