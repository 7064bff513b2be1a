import { fail, ok, type Result } from '@/lib/model/result'

/**
 * The desk's line to the shop's server: reading, the event stream and the account. The field has its
 * own (outbox and network); this one is for pages that are always online.
 */
export const LINE_PROBLEMS = [
  'noConnection',
  'signedOut',
  'forbidden',
  'notFound',
  'serverTrouble',
] as const
export type LineProblem = { kind: (typeof LINE_PROBLEMS)[number] }
export type SignInProblem = { kind: 'wrong' | 'locked' | 'noConnection' | 'serverTrouble' }

/** What the event stream tells. `data` is the text of one event, `id` its change number. */
export type StreamHandlers = {
  opened(): void
  event(name: string, data: string, id: string): void
  /** The line broke. `retrying`: the browser comes back by itself with the last id it had. */
  broken(retrying: boolean): void
}

export type ShopLine = {
  getJson(path: string): Promise<Result<unknown, LineProblem>>
  openStream(path: string, names: readonly string[], on: StreamHandlers): () => void
  signIn(email: string, password: string): Promise<Result<null, SignInProblem>>
  signOut(): Promise<Result<null, LineProblem>>
}

const problemOf = (status: number): LineProblem => {
  if (status === 401) return { kind: 'signedOut' }
  if (status === 403) return { kind: 'forbidden' }
  if (status === 404) return { kind: 'notFound' }
  return { kind: 'serverTrouble' }
}

/** Answers the parsed JSON of a GET, or why there is none. HTML in place of JSON is server trouble. */
async function getJson(path: string): Promise<Result<unknown, LineProblem>> {
  let answer: Response
  try {
    answer = await fetch(path, { headers: { accept: 'application/json' }, cache: 'no-store' })
  } catch {
    return fail({ kind: 'noConnection' })
  }
  if (!answer.ok) return fail(problemOf(answer.status))
  try {
    return ok(await answer.json())
  } catch {
    return fail({ kind: 'serverTrouble' })
  }
}

function openStream(path: string, names: readonly string[], on: StreamHandlers): () => void {
  const source = new EventSource(path)
  source.onopen = () => on.opened()
  source.onerror = () => on.broken(source.readyState !== EventSource.CLOSED)
  for (const name of names) {
    source.addEventListener(name, (event: MessageEvent<string>) =>
      on.event(name, event.data, event.lastEventId),
    )
  }
  return () => source.close()
}

/** Posts a form to next-auth with its cross-site token; the answer carries the address it would go to. */
async function postAccount(path: string, fields: Record<string, string>) {
  const token = await getJson('/api/auth/csrf')
  if (!token.ok) return token
  const csrfToken = String((token.value as { csrfToken?: unknown }).csrfToken ?? '')
  let answer: Response
  try {
    answer = await fetch(path, {
      method: 'POST',
      body: new URLSearchParams({ ...fields, csrfToken, json: 'true', callbackUrl: '/' }),
    })
  } catch {
    return fail<LineProblem>({ kind: 'noConnection' })
  }
  if (answer.status !== 401 && !answer.ok) return fail(problemOf(answer.status))
  try {
    const { url } = (await answer.json()) as { url?: unknown }
    return ok(new URL(String(url), window.location.origin).searchParams.get('error'))
  } catch {
    return fail<LineProblem>({ kind: 'serverTrouble' })
  }
}

/** Signs in with e-mail and password; keeps neither. The session travels in an http-only cookie. */
async function signIn(email: string, password: string): Promise<Result<null, SignInProblem>> {
  const answer = await postAccount('/api/auth/callback/credentials', { email, password })
  if (!answer.ok) {
    return fail({ kind: answer.problem.kind === 'noConnection' ? 'noConnection' : 'serverTrouble' })
  }
  if (answer.value === null) return ok(null)
  if (answer.value === 'CredentialsSignin') return fail({ kind: 'wrong' })
  return fail({ kind: answer.value === 'locked' ? 'locked' : 'serverTrouble' })
}

/** Ends the session at the server and drops its cookie. */
async function signOut(): Promise<Result<null, LineProblem>> {
  const answer = await postAccount('/api/auth/signout', {})
  return answer.ok ? ok(null) : answer
}

/** The line of a browser. */
export const browserShopLine: ShopLine = { getJson, openStream, signIn, signOut }
