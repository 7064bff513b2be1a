import NextAuth from 'next-auth'
import { authOptions } from '@/lib/auth/options'

type Context = { params: Promise<{ nextauth: string[] }> }

/** next-auth's own endpoints; made per request, as the settings are not there during a build. */
const handle = (request: Request, context: Context): Promise<Response> =>
  NextAuth(authOptions())(request, context)

export { handle as GET, handle as POST }
