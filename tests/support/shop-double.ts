import { createHash, createPublicKey, verify } from 'node:crypto'
import { gunzipSync } from 'node:zlib'
import { v7 } from 'uuid'
import type { Actor } from '@/lib/model/person'
import { HEADERS, signedText } from '@/lib/sync/protocol/device'
import {
  type Cursor,
  type OpResult,
  type PullAnswer,
  type PullRow,
  type SyncRequest,
  type SyncResponse,
  syncRequest,
} from '@/lib/sync/protocol/message'
import { type Op, op as opShape } from '@/lib/sync/protocol/op'
import { fullOp } from '@/lib/sync/protocol/short'
import { uploadText } from '@/lib/sync/protocol/upload'
import { MECHANIC, type TestFetch } from './phone'
import { readUploadRequest, UploadDouble, type UploadRequest } from './upload-double'

type Who = { shop: string; person: string; device: string }
type Row = { entity: string; id: string; jobId: string | null; row: unknown }

/** What a test does to one request: answer instead of the shop, or lose the shop's answer. */
export type Fault = (request: {
  path: string
  method: string
  body: Uint8Array
}) => { instead: Response } | { noLine: true } | { loseReply: true } | null

const json = (body: unknown, status = 200, headers: Record<string, string> = {}) =>
  new Response(JSON.stringify(body), {
    status,
    headers: { 'content-type': 'application/json', ...headers },
  })

const problem = (status: number, kind: string) => json({ kind, status }, status)

/**
 * A shop in memory that speaks the protocol and nothing of our server's code: it checks signatures,
 * takes each op once, numbers every change densely and hands out pages. Tests bend it by `fault`,
 * `refuse`, `pageRows` and `session`.
 */
export class ShopDouble {
  session: boolean = true
  /** Whose session it is. */
  actor: Actor = MECHANIC
  epoch = 'first'
  scopeVersion = 1
  pageRows = 500
  nowMs = Date.UTC(2026, 10, 24, 18, 40)
  fault: Fault = () => null
  /** Answers a result for an op that is not simply taken. */
  refuse: (op: Op) => OpResult | null = () => null
  readonly requests: { path: string; ops: number; bytes: number }[] = []
  readonly ops = new Map<string, Op>()
  readonly uploads = new UploadDouble()
  readonly photos = this.uploads.photos
  readonly seenDseqs: number[] = []
  /** Person of every signed request that was let in. */
  readonly senders: string[] = []
  readonly #devices = new Map<string, { x: string; y: string }>()
  readonly #rows = new Map<string, Row & { seq: number; state: PullRow['state'] }>()
  #seq = 0
  #jobs = 0
  #orders = new Map<string, number>()

  /** Adds or changes a row as the desk would. */
  put(entity: string, id: string, row: unknown, jobId: string | null = null): void {
    this.#seq += 1
    this.#rows.set(`${entity}/${id}`, { entity, id, jobId, row, seq: this.#seq, state: 'present' })
  }

  remove(entity: string, id: string, state: 'deleted' | 'evict' = 'deleted'): void {
    this.#seq += 1
    this.#rows.set(`${entity}/${id}`, { entity, id, jobId: null, row: null, seq: this.#seq, state })
  }

  row(entity: string, id: string): unknown {
    return this.#rows.get(`${entity}/${id}`)?.row
  }

  rowsOf(entity: string): unknown[] {
    return [...this.#rows.values()]
      .filter((row) => row.entity === entity && row.state === 'present')
      .map((row) => row.row)
  }

  forgetDevices(): void {
    this.#devices.clear()
  }

  /** As after a backup an hour old was brought back: the given ops are gone, a new epoch begins. */
  restoreWithout(opIds: readonly string[]): void {
    this.epoch = `${this.epoch}+`
    for (const opId of opIds) {
      const op = this.ops.get(opId)
      this.ops.delete(opId)
      if (op) this.#rows.delete(`${op.kind === 'log.add' ? 'logEntry' : 'job'}/${op.entityId}`)
    }
  }

  readonly fetch: TestFetch = (path, init) => Promise.resolve().then(() => this.#serve(path, init))

  #serve(path: string, init: RequestInit): Response {
    const body = init.body instanceof Uint8Array ? init.body : new Uint8Array()
    const fault = this.fault({ path, method: init.method ?? 'GET', body })
    if (fault !== null && 'noLine' in fault) throw new TypeError('Failed to fetch')
    if (fault !== null && 'instead' in fault) return fault.instead
    const method = init.method ?? 'GET'
    const answer = this.#answer(path, method, new Headers(init.headers), body)
    if (fault !== null) throw new TypeError('Failed to fetch')
    return answer
  }

  #answer(path: string, method: string, headers: Headers, body: Uint8Array): Response {
    if (path === '/api/devices') return this.#enrol(body)
    if (path === '/api/me') return this.session ? json(this.actor) : problem(401, 'signIn')
    if (path === '/api/auth/csrf') return json({ csrfToken: 'token' })
    if (path === '/api/auth/signout') return this.#signOut()
    if (path === '/api/sync') return this.#sync(headers, body)
    if (path.startsWith('/api/photos/tus')) {
      return this.#upload(readUploadRequest(path, method, headers), headers, body)
    }
    return problem(404, 'notFound')
  }

  #signOut(): Response {
    this.session = false
    return json({ url: '/' })
  }

  #enrol(body: Uint8Array): Response {
    if (!this.session) return problem(401, 'signIn')
    const { deviceId, publicKey } = JSON.parse(Buffer.from(body).toString('utf8'))
    this.#devices.set(deviceId, publicKey)
    return json({ deviceId, serverTime: new Date(this.nowMs).toISOString() })
  }

  #signed(headers: Headers, body: Uint8Array): Response | null {
    const dseq = headers.get(HEADERS.dseq) ?? ''
    const bodyHash = createHash('sha256').update(body).digest('base64url')
    const refused = this.#refusalOf(headers, (who) => signedText({ ...who, dseq, bodyHash }))
    return refused === null ? null : problem(401, refused)
  }

  /** Why a signed request is not let in; null when it is. */
  #refusalOf(headers: Headers, textOf: (who: Who) => string): string | null {
    const of = (name: keyof typeof HEADERS) => headers.get(HEADERS[name]) ?? ''
    const key = this.#devices.get(of('device'))
    if (key === undefined) return 'unknownDevice'
    const text = textOf({ shop: of('shop'), person: of('person'), device: of('device') })
    const publicKey = createPublicKey({
      key: { kty: 'EC', crv: 'P-256', x: key.x, y: key.y },
      format: 'jwk',
    })
    const fits = verify(
      'sha256',
      Buffer.from(text),
      { key: publicKey, dsaEncoding: 'ieee-p1363' },
      Buffer.from(of('signature'), 'base64url'),
    )
    if (!fits) return 'badSignature'
    this.senders.push(of('person'))
    return null
  }

  #sync(headers: Headers, body: Uint8Array): Response {
    const refusal = this.#signed(headers, body)
    if (refusal !== null) return refusal
    const request = syncRequest.parse(JSON.parse(gunzipSync(body).toString('utf8')))
    this.requests.push({ path: '/api/sync', ops: request.ops.length, bytes: body.byteLength })
    const taken: string[] = []
    const results: OpResult[] = []
    const said = {
      dev: headers.get(HEADERS.device) ?? '',
      personId: headers.get(HEADERS.person) ?? '',
    }
    for (const raw of request.ops) {
      const op = opShape.parse(request.brief === true ? fullOp(raw, said) : raw)
      const result = this.#take(op)
      if (result === null) taken.push(op.id)
      else results.push(result)
    }
    const answer: SyncResponse = {
      protocol: request.protocol,
      serverTime: new Date(this.nowMs).toISOString(),
      taken,
      results,
      pull: this.#pull(request),
      order: 'none',
      missing: [],
      lost: null,
    }
    return json(answer)
  }

  #take(op: Op): OpResult | null {
    if (this.ops.has(op.id)) return { opId: op.id, result: 'duplicate' }
    const refused = this.refuse(op)
    if (refused !== null) return refused
    this.ops.set(op.id, op)
    this.seenDseqs.push(op.dseq)
    this.#apply(op)
    return null
  }

  #apply(op: Op): void {
    if (op.kind === 'machine.add') this.put('machine', op.entityId, op.fields)
    if (op.kind === 'job.open') this.put('job', op.entityId, this.#opened(op), op.entityId)
    if (op.kind === 'job.move') {
      const job = this.row('job', op.entityId) as object
      this.put('job', op.entityId, { ...job, state: op.fields.to }, op.entityId)
    }
    if (op.kind === 'log.add') {
      const order = (this.#orders.get(op.fields.jobId) ?? 0) + 1
      this.#orders.set(op.fields.jobId, order)
      const row = {
        ...op.fields,
        order,
        hash: v7(),
        receivedAt: new Date(this.nowMs).toISOString(),
      }
      this.put('logEntry', op.entityId, row, op.fields.jobId)
    }
    if (op.kind === 'partRequest.ask') {
      const lines = op.fields.lines.map((line) => ({ ...line, state: 'asked' }))
      const row = { ...op.fields, lines, askedBy: MECHANIC.personId }
      this.put('partRequest', op.entityId, row, op.fields.jobId)
    }
  }

  #opened(op: Extract<Op, { kind: 'job.open' }>) {
    this.#jobs += 1
    return {
      ...op.fields,
      number: `J-${this.#jobs}`,
      state: 'open',
      peopleState: 'withMachine',
      machineState: 'stranded',
      wayOut: null,
      openedBy: MECHANIC.personId,
      assignedTo: [],
    }
  }

  #pull(request: SyncRequest): PullAnswer {
    if (!request.pull) return { kind: 'notAsked' }
    if (!this.session) return { kind: 'signIn' }
    const { epoch, scopeVersion } = this
    const start: Cursor = { epoch, shop: MECHANIC.shopId, scopeVersion, seq: 0 }
    const held = request.cursor
    const isReset =
      held !== null && (held.epoch !== this.epoch || held.scopeVersion !== this.scopeVersion)
    if (isReset) return { kind: 'reset', cursor: start }
    const after = held?.seq ?? 0
    const all = [...this.#rows.values()].filter((row) => row.seq > after)
    all.sort((a, b) => a.seq - b.seq)
    const rows = all.slice(0, this.pageRows)
    const more = all.length > rows.length
    const seq = more ? (rows.at(-1)?.seq ?? after) : this.#seq
    return { kind: 'page', rows, cursor: { ...start, seq }, more }
  }

  #upload(of: UploadRequest, headers: Headers, body: Uint8Array): Response {
    const refused = this.#refusalOf(headers, (who) => uploadText({ ...who, ...of }))
    if (refused !== null) {
      return new Response(null, {
        status: 401,
        headers: { 'x-farbench-problem': refused, 'tus-resumable': '1.0.0' },
      })
    }
    this.requests.push({ path: '/api/photos', ops: 0, bytes: body.byteLength })
    return this.uploads.take(of, body)
  }
}
