import { fail, ok, type Result } from '@/lib/model/result'
import type { Timer } from './clock'

/** One request of the phone. `path` is of our own origin, `body` the bytes exactly as signed. */
type NetworkRequest = {
  method: 'GET' | 'HEAD' | 'POST' | 'PUT' | 'PATCH'
  path: string
  headers?: Record<string, string>
  body?: Uint8Array<ArrayBuffer>
}

/** An answer, whole: `text` has been read to its end. */
export type Answer = {
  status: number
  contentType: string
  header(name: string): string | null
  text: string
}

/** `noConnection`: nobody answered, or a redirect did (a captive portal). `tooSlow`: cut after the time allowed. */
export type NetworkProblem = { kind: 'noConnection' | 'tooSlow' }

export type Network = {
  /** A hint only (P17): true may be wrong. */
  online(): boolean
  send(request: NetworkRequest): Promise<Result<Answer, NetworkProblem>>
}

/** Slowest line we still wait for, in bytes per second: about 8 kbit/s (a choice of ours). */
const SLOWEST_BYTES_PER_SECOND = 1_000
const LEAST_WAIT_MS = 45_000

/** Milliseconds to wait for a request of this size before it counts as cut (P15). */
function patienceMs(bytes: number): number {
  return LEAST_WAIT_MS + (bytes / SLOWEST_BYTES_PER_SECOND) * 1000
}

function toFetch({ method, headers, body }: NetworkRequest): RequestInit {
  return {
    method,
    // A POST is answered from no cache, and saying so costs two lines of every request.
    cache: method === 'POST' ? 'default' : 'no-store',
    credentials: 'same-origin',
    referrerPolicy: 'no-referrer',
    redirect: 'error',
    ...(headers === undefined ? {} : { headers }),
    ...(body === undefined ? {} : { body }),
  }
}

/** A network over any fetch; `online` is the hint. Tests hand in their own fetch. */
export function networkOf(how: {
  fetch: typeof fetch
  online: () => boolean
  timer: Timer
}): Network {
  return {
    online: how.online,
    async send(request) {
      const cut = new AbortController()
      let slow = false
      const callOff = how.timer.after(patienceMs(request.body?.byteLength ?? 0), () => {
        slow = true
        cut.abort()
      })
      try {
        const answer = await how.fetch(request.path, { ...toFetch(request), signal: cut.signal })
        const text = await answer.text()
        if (answer.redirected) return fail({ kind: 'noConnection' })
        return ok({
          status: answer.status,
          contentType: answer.headers.get('content-type') ?? '',
          header: (name) => answer.headers.get(name),
          text,
        })
      } catch {
        return fail({ kind: slow ? 'tooSlow' : 'noConnection' })
      } finally {
        callOff()
      }
    },
  }
}
