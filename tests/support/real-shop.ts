import { POST as postDevice } from '@/app/api/devices/route'
import { GET as getMe } from '@/app/api/me/route'
import { PUT as putPhoto } from '@/app/api/photos/[hash]/route'
import { PATCH as addPhoto, HEAD as askPhoto } from '@/app/api/photos/tus/[hash]/route'
import { POST as beginPhoto } from '@/app/api/photos/tus/route'
import { POST as postSync } from '@/app/api/sync/route'
import type { TestFetch } from './phone'

/** What may go wrong on the line: nothing, no line at all, or the answer lost after the shop worked. */
export type LineFault = 'none' | 'noLine' | 'loseReply'

/**
 * The shop's real route handlers behind a phone's fetch, with the cookie of whoever is signed in. Keeps
 * a list of what was asked, and lets a test break the line.
 */
export class RealShop {
  readonly asked: string[] = []
  fault: LineFault = 'none'
  cookie: string | null
  /** Answers in place of the shop while it is set. */
  instead: Response | null = null
  /** Runs after the shop has answered, before the phone hears it. */
  after: (path: string) => Promise<void> = () => Promise.resolve()

  constructor(cookie: string | null) {
    this.cookie = cookie
  }

  fetch: TestFetch = async (path, init) => {
    if (this.fault === 'noLine') throw new TypeError('no line')
    this.asked.push(`${init.method ?? 'GET'} ${path.split('/').slice(0, 3).join('/')}`)
    const headers = new Headers(init.headers)
    if (this.cookie !== null) headers.set('cookie', this.cookie)
    const body = init.body === undefined ? {} : { body: init.body }
    const request = new Request(`http://shop.invalid${path}`, {
      method: init.method ?? 'GET',
      headers,
      ...body,
    })
    if (this.instead !== null) return this.instead.clone()
    const answer = await this.#answer(path, request)
    await this.after(path)
    if (this.fault === 'loseReply') throw new TypeError('reply lost')
    return answer
  }

  #photo(request: Request, context: { params: Promise<{ hash: string }> }): Promise<Response> {
    if (request.method === 'HEAD') return askPhoto(request, context)
    return request.method === 'PATCH' ? addPhoto(request, context) : putPhoto(request, context)
  }

  #answer(path: string, request: Request): Response | Promise<Response> {
    const hash = /^\/api\/photos\/(?:tus\/)?([0-9a-f]{64})$/.exec(path)?.[1]
    if (hash !== undefined) return this.#photo(request, { params: Promise.resolve({ hash }) })
    switch (path) {
      case '/api/sync':
        return postSync(request)
      case '/api/devices':
        return postDevice(request)
      case '/api/photos/tus':
        return beginPhoto(request)
      case '/api/me':
        return getMe(request)
      case '/api/auth/csrf':
        return Response.json({ csrfToken: 'token' })
      case '/api/auth/signout':
        this.cookie = null
        return Response.json({ url: '/' })
      default:
        return new Response('not found', { status: 404 })
    }
  }
}
