import { answer, ask, messageOf, PULL } from '../../floor.js'

/** What is after the cursor: one statement, no scope. */
export async function POST(request) {
  const { message } = await messageOf(request)
  const rows = await ask(PULL, [message.shop, message.seq])
  return answer({ rows, seq: rows.at(-1)?.seq ?? message.seq })
}
