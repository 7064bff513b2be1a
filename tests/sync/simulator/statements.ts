// Every statement of the shop's program passes here on its way to PostgreSQL: gates of a race, faults of
// the database, and the wrong programs of the mutation check.
import { AsyncLocalStorage } from 'node:async_hooks'
import pg from 'pg'
import type { Actor, Stage } from './stage'

type Client = pg.Client & { processID?: number }
type Query = (text: string, values?: unknown[]) => Promise<pg.QueryResult>

/** What goes wrong with the database during one request. */
export type DatabaseFault =
  /** No connection to be had. */
  | { kind: 'poolExhausted' }
  /** Somebody holds the counter for longer than the lock is waited for. */
  | { kind: 'lockTimeout' }
  /** The backend is ended before the n-th statement. */
  | { kind: 'backendKilled'; at: number }
  /** The n-th commit is done, and the connection is gone before its answer. */
  | { kind: 'answerOfCommitLost'; at: number }

/** What the statements of one request belong to. */
export type Passage = {
  actor: Actor | undefined
  fault: DatabaseFault | null
  /** Statements and commits so far. */
  count: number
  commits: number
}

/** A wrong program in place of the right one, for the mutation check. */
export type Rewrite = (statement: {
  client: Client
  text: string
  values: unknown[]
  run: Query
  /** Where another actor may come in between. */
  gate(at: string): Promise<void>
}) => Promise<pg.QueryResult>

type Hook = {
  stage: Stage | null
  rewrite: Rewrite | null
  /** Ends a backend and waits until it is gone. */
  kill: (pid: number) => Promise<void>
  /** Locks the counters of the run until the answer is called. */
  holdCounters: () => Promise<() => Promise<void>>
}

const passages = new AsyncLocalStorage<Passage>()
const hook: Hook = {
  stage: null,
  rewrite: null,
  kill: () => Promise.resolve(),
  holdCounters: () => Promise.resolve(() => Promise.resolve()),
}
let installed = false

/** Runs something of the shop's program; its statements go under this passage. */
export const through = <T>(passage: Passage, run: () => Promise<T>): Promise<T> =>
  passages.run(passage, run)

/** Sets what statements meet from now on. */
export function setHook(now: Partial<Hook>): void {
  install()
  Object.assign(hook, now)
}

function install(): void {
  if (installed) return
  installed = true
  const { prototype } = pg.Client
  const plain = prototype.query as unknown as (...args: unknown[]) => unknown
  const query = function query(this: Client, ...args: unknown[]): unknown {
    const [first, second] = args
    // A statement with a name is one object.
    const named = first as { text?: unknown; values?: unknown[]; name?: string } | null
    const isNamed = typeof named === 'object' && typeof named?.name === 'string'
    const [text, values] = isNamed ? [named?.text, named?.values] : [first, second]
    const passes = passages.getStore() !== undefined || hook.rewrite !== null
    const isPlain = typeof text !== 'string' || args.some((arg) => typeof arg === 'function')
    if (isPlain || !passes) return plain.apply(this, args)
    const run: Query = (now, with_) => plain.call(this, now, with_) as Promise<pg.QueryResult>
    return passed(this, { text, values: (values as unknown[] | undefined) ?? [], run })
  }
  Object.assign(prototype, { query })
  const pool = pg.Pool.prototype
  const connect = pool.connect as unknown as (...args: unknown[]) => unknown
  const guarded = function guarded(this: pg.Pool, ...args: unknown[]): unknown {
    if (passages.getStore()?.fault?.kind === 'poolExhausted') {
      return Promise.reject(new Error('timeout exceeded when trying to connect'))
    }
    return connect.apply(this, args)
  }
  Object.assign(pool, { connect: guarded })
}

type Given = { text: string; values: unknown[]; run: Query }

async function passed(client: Client, given: Given): Promise<pg.QueryResult> {
  const passage = passages.getStore()
  const actor = passage?.actor
  const gate = async (at: string) => hook.stage?.gate(actor, at)
  if (/take_changes|take_evidence/.test(given.text)) changing.add(client)
  await gate(labelOf(client, given.text))
  if (passage !== undefined) passage.count += 1
  const fault = passage?.fault ?? null
  if (fault?.kind === 'backendKilled' && passage?.count === fault.at) {
    await hook.kill(client.processID ?? 0)
  }
  const run: Query = async (text, values) => {
    if (actor !== undefined) actor.pid = client.processID ?? null
    try {
      return await given.run(text, values)
    } finally {
      if (actor !== undefined) actor.pid = null
    }
  }
  const isLock = /lock_counter|take_changes|take_evidence|take_job_numbers/.test(given.text)
  if (fault?.kind === 'lockTimeout' && isLock) return await underHolder({ ...given, run })
  const { text, values } = given
  const answer = hook.rewrite
    ? await hook.rewrite({ client, text, values, run, gate })
    : await run(text, values)
  if (text === 'commit' && passage !== undefined) passage.commits += 1
  if (fault?.kind === 'answerOfCommitLost' && passage?.commits === fault.at) {
    passage.fault = null
    throw new Error('Connection terminated unexpectedly')
  }
  return answer
}

/** A counter that somebody else holds: the lock is waited for a moment, and not had. */
async function underHolder({ text, values, run }: Given): Promise<pg.QueryResult> {
  const letGo = await hook.holdCounters()
  try {
    await run(`set local lock_timeout = '25ms'`)
    return await run(text, values)
  } finally {
    await letGo()
  }
}

/** Connections whose transaction has taken change numbers. */
const changing = new WeakSet<Client>()

/** A statement by what matters in it, or its first words. */
function labelOf(client: Client, text: string): string {
  if (text === 'commit' && changing.delete(client)) return 'commit of changes'
  const named =
    /lock_counter|take_changes|take_evidence|take_job_numbers|open_exchange|set_config|shop_counter|change_log/
  return named.exec(text)?.[0] ?? text.trim().split(/\s+/).slice(0, 4).join(' ')
}
