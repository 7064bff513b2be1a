import * as z from 'zod/mini'

/** One change of the shop, as the event stream tells it: what changed, not its contents. */
const change = z.object({
  seq: z.int(),
  entity: z.string(),
  id: z.string(),
  jobId: z.nullable(z.string()),
})
export type Change = z.infer<typeof change>

const state = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('opening') }),
  z.object({ kind: z.literal('live'), heardAt: z.number() }),
  z.object({ kind: z.literal('lost'), heardAt: z.nullable(z.number()) }),
  z.object({ kind: z.literal('signedOut') }),
])

/** How the line to the shop is. `heardAt`: ms since 1970, by this browser's clock. */
export type LineState = z.infer<typeof state>

/** What tabs of one browser say to each other. */
const word = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('hello') }),
  z.object({ kind: z.literal('state'), state }),
  z.object({ kind: z.literal('change'), change }),
  z.object({ kind: z.literal('gap') }),
])
export type LiveWord = z.infer<typeof word>

/** The change in one event's text, or null for text this build cannot read. */
export function readChange(data: string): Change | null {
  try {
    return change.parse(JSON.parse(data))
  } catch {
    return null
  }
}

/** A word of another tab, or null: an older build may still be open there. */
export function readWord(said: unknown): LiveWord | null {
  const answer = word.safeParse(said)
  return answer.success ? answer.data : null
}

/** Pause before the next try of a closed stream: 1, 2, 4, 8, then 15 s (common practice, no source). */
export function backoffMs(tries: number): number {
  return Math.min(15_000, 1000 * 2 ** Math.min(tries, 4))
}
