import type { Result } from '@/lib/model/result'
import type { Answer, NetworkProblem } from '@/lib/ports/network'

/**
 * What an answer means for what was sent (P16, P17, P18):
 * - `ours`: the shop took the request; `json` is its answer, null when it has none.
 * - `unreachable`: nobody of ours answered: no line, cut, a captive portal's page or redirect.
 * - `later`: the shop asks to wait, or something on the way broke; `afterMs` when it said how long.
 * - `smaller`: too much at once.
 * - `signIn`, `enrol`, `updateApp`, `refused`: something must happen first; all work is kept.
 * - `never`: the shop will not take this as it is; `code` says why.
 */
export type Reply =
  | { kind: 'ours'; json: unknown }
  | { kind: 'unreachable' }
  | { kind: 'later'; afterMs: number | null }
  | { kind: 'smaller' }
  | { kind: 'signIn' }
  | { kind: 'enrol' }
  | { kind: 'updateApp' }
  | { kind: 'refused' }
  | { kind: 'never'; code: string }

/** Longest wait the shop may ask for, ms; it is asked again then. */
const LONGEST_WAIT_MS = 3600 * 1000

/** 400s that say the bytes were hurt on the way, not that they are wrong. */
const HURT_ON_THE_WAY = ['badGzip', 'badSignature', 'wrongHash']

/** Reads an answer. `nowMs` is for a Retry-After that names a date. */
export function readReply(sent: Result<Answer, NetworkProblem>, nowMs: number): Reply {
  if (!sent.ok) return { kind: 'unreachable' }
  const answer = sent.value
  if (answer.status === 413) return { kind: 'smaller' }
  // Network Authentication Required (RFC 6585): the portal itself speaks.
  if (answer.status === 511) return { kind: 'unreachable' }
  if (answer.status === 408 || answer.status === 429 || answer.status >= 500) {
    return { kind: 'later', afterMs: retryAfterMs(answer.header('retry-after'), nowMs) }
  }
  const json = jsonOf(answer)
  if (json === undefined) return { kind: 'unreachable' }
  if (answer.status < 300) return { kind: 'ours', json }
  return refusal(answer.status, kindOf(json))
}

/** What a refusal of ours means, by its status and kind. */
export function refusal(status: number, kind: string): Exclude<Reply, { kind: 'ours' }> {
  if (HURT_ON_THE_WAY.includes(kind)) return { kind: 'later', afterMs: null }
  if (kind === 'unknownDevice') return { kind: 'enrol' }
  switch (status) {
    case 401:
      return { kind: 'signIn' }
    case 403:
      return { kind: 'refused' }
    case 409:
      return { kind: 'later', afterMs: null }
    case 426:
      return { kind: 'updateApp' }
    default:
      return { kind: 'never', code: kind }
  }
}

/** The answer's JSON; null for an empty 204, undefined for anything a stranger on the line may have sent. */
function jsonOf(answer: Answer): unknown {
  if (answer.status === 204 && answer.text === '') return null
  if (!/^application\/(problem\+)?json\b/i.test(answer.contentType)) return undefined
  try {
    return JSON.parse(answer.text)
  } catch {
    return undefined
  }
}

function kindOf(json: unknown): string {
  if (typeof json !== 'object' || json === null || !('kind' in json)) return 'unknown'
  return typeof json.kind === 'string' ? json.kind : 'unknown'
}

/** Retry-After (RFC 9110, 10.2.3): seconds or a date; null when there is none to read. */
function retryAfterMs(header: string | null, nowMs: number): number | null {
  if (header === null) return null
  const asked = /^\d+$/.test(header) ? Number(header) * 1000 : Date.parse(header) - nowMs
  return Number.isFinite(asked) ? Math.min(Math.max(0, asked), LONGEST_WAIT_MS) : null
}
