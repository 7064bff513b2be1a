import * as z from 'zod/mini'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { readReply } from './reply'

const csrf = z.object({ csrfToken: z.string() })
const text = new TextEncoder()

/** Ends the session at the shop (next-auth's sign-out asks for its token first). False when not reached. */
export async function endSession(ports: SyncPorts): Promise<boolean> {
  const { network, clock } = ports
  const asked = readReply(
    await network.send({ method: 'GET', path: '/api/auth/csrf' }),
    clock.now(),
  )
  const read = asked.kind === 'ours' ? csrf.safeParse(asked.json) : undefined
  if (read?.success !== true) return false
  const form = new URLSearchParams({ csrfToken: read.data.csrfToken, json: 'true' })
  const sent = await network.send({
    method: 'POST',
    path: '/api/auth/signout',
    headers: { 'content-type': 'application/x-www-form-urlencoded' },
    body: text.encode(form.toString()),
  })
  return readReply(sent, clock.now()).kind === 'ours'
}
