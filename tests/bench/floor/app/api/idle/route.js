import { answer, ask, isSigned, messageOf, PULL } from '../../floor.js'

/** An exchange with nothing to tell; with a signature header it is checked first. */
export async function POST(request) {
  const { raw, message } = await messageOf(request)
  if (request.headers.has('x-floor-signature') && !(await isSigned(request, raw)))
    return new Response(null, { status: 401 })
  const rows = await ask(PULL, [message.shop, message.seq])
  return answer({ rows, seq: rows.at(-1)?.seq ?? message.seq })
}
