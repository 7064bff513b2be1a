// A mechanic in the field who never stops: opens jobs, writes, pushes, and sends again what nobody answered.
import { unfolded } from '@/lib/sync/protocol/brief'
import { type PullAnswer, type SyncResponse, syncResponse } from '@/lib/sync/protocol/message'
import type { Op } from '@/lib/sync/protocol/op'
import { adviceKeep, jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import { opsOf } from '../support/field-sets'
import type { RawDevice } from '../support/raw-device'
import type { Draw } from '../sync/simulator/draw'
import { broken, pause } from './tally'

/** Carries a request to the shop; throws when the line breaks before there is a whole answer. */
export type Carry = (request: Request) => Promise<Response>

const BUSY_MS = 100
const MOST_TRIES = 600

type Work = { jobId: string; requestId: string; lineId: string; machineId: string }

export class FieldHand {
  readonly device: RawDevice
  readonly #cookie: string
  readonly #draw: Draw
  readonly #carry: Carry
  /** Every op ever made, in the order of its number. */
  readonly made: Op[] = []
  /** Ids of ops that the shop has answered for. */
  readonly acknowledged = new Set<string>()
  /** Ids of jobs it opened. */
  readonly jobs: string[] = []
  /** The batch that was sent and not answered for; it goes again as it is. */
  unsure: Op[] = []
  inFlight: boolean = false
  /** Change number at which each row came last. */
  readonly seen = new Map<string, number>()
  #work: Work | null = null
  #words = 0

  constructor(of: { device: RawDevice; cookie: string; draw: Draw; carry: Carry }) {
    this.device = of.device
    this.#cookie = of.cookie
    this.#draw = of.draw
    this.#carry = of.carry
  }

  /** Pushes new batches, one after the other, until it is told to stop or the line breaks. */
  async push(isOver: () => boolean): Promise<void> {
    if (this.#draw.chance(0.5)) this.#work = null
    while (!isOver()) {
      if (this.unsure.length === 0) this.unsure = this.#batch()
      const sent = await this.#send(this.unsure)
      if (sent === 'broken') return
      if (sent === 'busy') await pause(BUSY_MS)
    }
  }

  /** Sends the unanswered batch until it is taken, and pulls until there is no more. */
  async finish(isOver: () => boolean = () => false): Promise<void> {
    for (let tries = 0; !isOver(); tries += 1) {
      if (tries > MOST_TRIES) broken('P16', `a batch is not taken after ${MOST_TRIES} tries`)
      const sent = await this.#send(this.unsure)
      if (sent === 'even') return
      if (sent !== 'more') await pause(BUSY_MS)
    }
  }

  #batch(): Op[] {
    const work = this.#work
    if (work === null) return this.#opening()
    return Array.from({ length: this.#draw.between(1, 60) }, () => this.#one(work))
  }

  #keep(op: Op): Op {
    this.made.push(op)
    return op
  }

  /** A machine, a job on it, and its part request, so that a batch that is torn would leave orphans. */
  #opening(): Op[] {
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    const ask = partRequestAsk(job.fields.id)
    const [line] = ask.fields.lines
    this.#work = {
      jobId: job.fields.id,
      machineId: machine.fields.id,
      requestId: ask.fields.id,
      lineId: line?.id ?? '',
    }
    this.jobs.push(job.fields.id)
    return [machine, job, ask].map((input) => this.#keep(this.device.op(input)))
  }

  #one(work: Work): Op {
    const make = opsOf(this.device)
    this.#words += 1
    switch (this.#draw.below(8)) {
      case 0:
        // What counts shows at once whether it was taken twice.
        return this.#keep(make.countLine(work, work.lineId, this.#draw.between(1, 3)))
      case 1:
        return this.#keep(make.setMachine(work.machineId, { field: 'hours', value: this.#words }))
      case 2:
        return this.#keep(this.device.op(adviceKeep(work.jobId)))
      default: {
        const words = note(`Line ${this.#words}, ${'wet coil '.repeat(this.#draw.below(12))}`)
        return this.#keep(this.device.op(logAdd(this.device, work.jobId, words)))
      }
    }
  }

  /** One exchange: `broken` without an answer, `even` when all is taken and nothing more is to be pulled. */
  async #send(ops: Op[]): Promise<'broken' | 'busy' | 'more' | 'even'> {
    const brief = this.#draw.chance(0.5)
    const request = this.device.push(ops, { cookie: this.#cookie, brief })
    this.inFlight = ops.length > 0
    let answer: Response
    let text: string
    try {
      answer = await this.#carry(request)
      text = await answer.text()
    } catch {
      return 'broken'
    } finally {
      this.inFlight = false
    }
    if (BUSY.includes(answer.status)) return 'busy'
    if (answer.status !== 200) return broken('P5', `the shop answered ${answer.status}: ${text}`)
    const told = unfolded(syncResponse.parse(JSON.parse(text)), ops)
    if (told === undefined) return broken('P9', 'a brief answer speaks of ops that were not sent')
    this.#settle(told)
    return this.#pulled(told.pull) || this.unsure.length > 0 ? 'more' : 'even'
  }

  #settle({ taken, results }: SyncResponse): void {
    for (const id of taken) this.acknowledged.add(id)
    for (const result of results) {
      if (result.result === 'duplicate') this.acknowledged.add(result.opId)
      // Busy at the shop's counter; everything else would be a refusal of what is right.
      else if (result.result !== 'retry') broken('P4', `refused: ${JSON.stringify(result)}`)
    }
    this.unsure = this.unsure.filter((op) => !this.acknowledged.has(op.id))
  }

  /** Keeps the page; true when more waits. */
  #pulled(pull: PullAnswer): boolean {
    if (pull.kind !== 'page' && pull.kind !== 'reset') return broken('P18', `pull: ${pull.kind}`)
    const before = this.device.cursor
    this.device.cursor = pull.cursor
    if (pull.kind === 'reset') {
      if (before !== null) broken('P12', `cursor ${JSON.stringify(before)} was reset`)
      return true
    }
    if (pull.cursor.seq < (before?.seq ?? 0))
      broken('P8', `the cursor went back from ${before?.seq}`)
    for (const row of pull.rows) {
      const key = `${row.entity}/${row.id}`
      if ((this.seen.get(key) ?? 0) >= row.seq) broken('P7', `${key} came twice at ${row.seq}`)
      this.seen.set(key, row.seq)
    }
    return pull.more
  }
}

/** Told to come back: nothing was settled. */
const BUSY = [429, 503]
