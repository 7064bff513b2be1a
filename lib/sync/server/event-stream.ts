import { asShop } from '@/db/client'
import { changesAfter } from '@/db/queries/change-log'
import { logBounds } from '@/db/queries/changes'
import { jobsById } from '@/db/queries/jobs'
import type { Actor } from '@/lib/model/person'
import { systemTimer, type Timer } from '@/lib/ports/clock'
import { may } from '@/lib/shop/permissions'
import { seesJob } from '@/lib/shop/scope'
import type { EventHub, ShopChange } from './event-hub'

/**
 * One desk's event stream. Events say what changed and never what is in it: the desk reads that with
 * its session. Order (bones.md 4): subscribe and hold back, read the log from the last number the desk
 * had, hand out what was held back, then live; numbers at or below the last one told are dropped.
 * A reader who does not read is let go; it comes back with Last-Event-ID.
 */
export type StreamParts = {
  hub: EventHub
  actor: Actor
  /** The Last-Event-ID header: the last change number the desk was told, or null. */
  lastEventId: string | null
  signal: AbortSignal
  /** Whether the session is still good; asked at every beat. */
  isStillGood: () => Promise<boolean>
  timer?: Timer
  beatMs?: number
}

/** A sign of life and a look at the session this often; the desk counts 60 s of silence as a dead line. */
const BEAT_MS = 15_000
/** More missed changes than this are not told one by one: the desk reads anew. */
const MAX_REPLAY = 2_000
const BUFFER_BYTES = 64_000
const MAX_BEHIND_BYTES = 256_000

const encoder = new TextEncoder()
const frame = (event: string, data: string, id?: number) =>
  encoder.encode(`${id === undefined ? '' : `id: ${id}\n`}event: ${event}\ndata: ${data}\n\n`)

/** Changes of job rows are told to the whole desk; what hangs on a job only to those who see the job. */
async function visibleTo(actor: Actor, changes: readonly ShopChange[]): Promise<ShopChange[]> {
  if (may(actor.roles, 'job.seeAll')) return [...changes]
  const ids = new Set(changes.flatMap((change) => (change.jobId === null ? [] : [change.jobId])))
  const jobs = await asShop(actor.shopId, (tx) => jobsById(tx, [...ids]))
  const seen = new Set(jobs.filter((job) => seesJob(actor, job)).map((job) => job.id))
  return changes.filter(
    ({ entity, jobId }) => jobId === null || entity === 'job' || seen.has(jobId),
  )
}

const readLastId = (text: string | null): number | null =>
  text !== null && /^\d{1,15}$/.test(text) ? Number(text) : null

class DeskStream {
  readonly #parts: StreamParts
  readonly #controller: ReadableStreamDefaultController<Uint8Array>
  readonly #releases: (() => void)[] = []
  #held: ShopChange[] | null = []
  #told = 0
  #telling: Promise<void> = Promise.resolve()
  readonly #over = new AbortController()

  constructor(parts: StreamParts, controller: ReadableStreamDefaultController<Uint8Array>) {
    this.#parts = parts
    this.#controller = controller
  }

  get #isOver(): boolean {
    return this.#over.signal.aborted
  }

  async start(): Promise<void> {
    const { hub, actor, signal } = this.#parts
    if (signal.aborted) return this.stop()
    const stop = () => this.stop()
    signal.addEventListener('abort', stop, { once: true })
    this.#releases.push(hub.keep(stop), () => signal.removeEventListener('abort', stop))
    const leave = await hub.subscribe(actor.shopId, (changes) => this.#hear(changes))
    this.#releases.push(leave)
    if (this.#isOver) return leave()
    await this.#catchUp()
    this.#beat()
  }

  stop(): void {
    if (this.#isOver) return
    this.#over.abort()
    for (const release of this.#releases.splice(0)) release()
    try {
      this.#controller.close()
    } catch {
      // The reader closed it first.
    }
  }

  /** Reads what the desk missed, then lets through what came in meanwhile. */
  async #catchUp(): Promise<void> {
    const { actor, lastEventId } = this.#parts
    const from = readLastId(lastEventId)
    const { now, missed } = await asShop(actor.shopId, async (tx) => {
      const { last: now, horizon } = await logBounds(tx)
      const isWhole = from !== null && from >= horizon && from <= now
      const isKnown = isWhole && now - from <= MAX_REPLAY
      return {
        now,
        missed: isKnown ? await changesAfter(tx, { seq: from, limit: MAX_REPLAY * 2 }) : null,
      }
    })
    if (lastEventId !== null && missed === null) this.#send(frame('resync', String(now), now))
    this.#told = missed === null ? now : (from ?? now)
    await this.#tell(missed ?? [])
    this.#send(frame('beat', String(this.#told), this.#told))
    const held = this.#held ?? []
    this.#held = null
    this.#queue(held)
  }

  #hear(changes: readonly ShopChange[]): void {
    if (this.#held) this.#held.push(...changes)
    else this.#queue(changes)
  }

  /** One after the other: who may see what is asked of the database, and order must not suffer. */
  #queue(changes: readonly ShopChange[]): void {
    this.#telling = this.#telling.then(() => this.#tell(changes)).catch(() => this.stop())
  }

  async #tell(changes: readonly ShopChange[]): Promise<void> {
    const fresh = changes.filter((change) => change.seq > this.#told)
    const last = fresh.at(-1)
    if (!last || this.#isOver) return
    this.#told = last.seq
    for (const { seq, entity, id, jobId } of await visibleTo(this.#parts.actor, fresh)) {
      this.#send(frame('change', JSON.stringify({ seq, entity, id, jobId }), seq))
    }
  }

  #send(bytes: Uint8Array): void {
    if (this.#isOver) return
    if ((this.#controller.desiredSize ?? 0) < -MAX_BEHIND_BYTES) this.stop()
    else this.#controller.enqueue(bytes)
  }

  #beat(): void {
    if (this.#isOver) return
    const { timer = systemTimer, beatMs = BEAT_MS, isStillGood } = this.#parts
    const callOff = timer.after(beatMs, () => {
      this.#releases.splice(this.#releases.indexOf(callOff), 1)
      isStillGood().then(
        (isGood) => (isGood ? this.#beatOn() : this.stop()),
        () => this.stop(),
      )
    })
    this.#releases.push(callOff)
  }

  /** The number goes with it, so that a desk that hears nothing else still comes back at the right place. */
  #beatOn(): void {
    this.#telling = this.#telling.then(() =>
      this.#send(frame('beat', String(this.#told), this.#told)),
    )
    this.#beat()
  }
}

/** Answers the stream of one desk as `text/event-stream`: `change`, `resync` and `beat` events. */
export function streamEvents(parts: StreamParts): Response {
  let stream: DeskStream | undefined
  const body = new ReadableStream<Uint8Array>(
    {
      start(controller) {
        stream = new DeskStream(parts, controller)
        // Not awaited: bytes flow while it catches up. Trouble on the way ends it; the desk comes back.
        stream.start().catch(() => stream?.stop())
      },
      cancel: () => stream?.stop(),
    },
    { highWaterMark: BUFFER_BYTES, size: (chunk) => chunk.byteLength },
  )
  const headers = {
    'content-type': 'text/event-stream; charset=utf-8',
    'cache-control': 'no-cache, no-transform',
    'x-accel-buffering': 'no',
  }
  return new Response(body, { headers })
}
