import { randomBytes } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { type NextRequest, NextResponse } from 'next/server'
import { envPublic } from '@/lib/env-public'

/**
 * Sets the content security policy. Static documents carry inline scripts of the framework: their
 * hashes were written at build time (scripts/build-csp.mjs); every other page gets a nonce. Both
 * forbid inline script that is not ours. Without csp.json a production server must not answer.
 */
type Hashes = Record<string, string[] | undefined>

function readHashes(): Hashes {
  try {
    return JSON.parse(readFileSync(join(process.cwd(), '.next', 'csp.json'), 'utf8')) as Hashes
  } catch (cause) {
    if (envPublic.production) {
      throw new Error('.next/csp.json is missing: run npm run build', { cause })
    }
    return {}
  }
}

const hashes = readHashes()
const development = !envPublic.production

function policy(scripts: string, styles: string): string {
  return [
    "default-src 'none'",
    `script-src 'self' ${scripts}${development ? " 'unsafe-eval' 'unsafe-inline'" : ''}`,
    `style-src 'self' ${development ? "'unsafe-inline'" : styles}`,
    "img-src 'self' blob: data:",
    "media-src 'self' blob:",
    "font-src 'self'",
    `connect-src 'self'${development ? ' ws:' : ''}`,
    "worker-src 'self'",
    "manifest-src 'self'",
    "frame-ancestors 'none'",
    "base-uri 'none'",
    "form-action 'self'",
  ].join('; ')
}

/** Answers the request with the policy that fits its document. */
export function proxy(request: NextRequest) {
  const path = request.nextUrl.pathname
  const known = hashes[path.startsWith('/field/') ? '/field' : path]
  if (known) {
    const answer = NextResponse.next()
    answer.headers.set('content-security-policy', policy(known.join(' '), ''))
    return answer
  }
  const nonce = randomBytes(16).toString('base64')
  const own = development ? '' : `'nonce-${nonce}' ${(hashes['/_not-found'] ?? []).join(' ')}`
  const csp = policy(own, `'nonce-${nonce}'`)
  const headers = new Headers(request.headers)
  headers.set('content-security-policy', csp)
  const answer = NextResponse.next({ request: { headers } })
  answer.headers.set('content-security-policy', csp)
  return answer
}

export const config = {
  matcher: ['/((?!api/|_next/|sw.js|fonts/|icons/|theme.js|manifest.webmanifest|favicon.ico).*)'],
}
