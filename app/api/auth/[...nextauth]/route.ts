import { NextRequest } from 'next/server'
import NextAuth from 'next-auth'
import { authOptions } from '@/lib/auth/options'
import { readCapped } from '@/lib/sync/server/body'
import { problemAnswer } from '@/lib/sync/server/problems'

type Context = { params: Promise<{ nextauth: string[] }> }

/** Most bytes of a form of the account: e-mail, password and token take less than 1 KiB (a choice). */
const MAX_FORM_BYTES = 8 * 1024

/** next-auth's own endpoints; made per request, as the settings are not there during a build. */
const handle = (request: Request, context: Context): Promise<Response> =>
  NextAuth(authOptions())(request, context)

/** next-auth reads a body whole, whoever sends it: it only gets one that was counted first. */
export async function POST(request: Request, context: Context): Promise<Response> {
  const body = await readCapped(request, MAX_FORM_BYTES)
  if (!body.ok) return problemAnswer(body.problem)
  const { url, method, headers } = request
  const counted = body.value.byteLength === 0 ? null : new Uint8Array(body.value)
  return handle(new NextRequest(url, { method, headers, body: counted }), context)
}

export { handle as GET }
