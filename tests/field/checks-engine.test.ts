import { describe, expect, it } from 'vitest'
import { type AdviceInputs, adviceOf, caseOfAdvice } from '@/components/engine/advice'
import { EngineClient } from '@/components/engine/engine-client'
import { specForEngine } from '@/components/engine/spec-kept'
import { engineView, keyOf } from '@/components/engine/use-engine'
import { type CaseInput, type Question, workOut } from '@/components/engine/work'
import type { FromWorker, ToWorker } from '@/components/engine/worker-messages'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { indexBook } from '@/lib/diag/book-index'
import type { Means } from '@/lib/diag/plan'
import { BAG, METER, SHOP } from '@/scripts/demo-shop'
import { entry } from './checks-log'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
const model = DEMO_MODELS[0]
const code = entry({
  kind: 'code',
  seen: { format: 'spn', spn: 1268, fmi: 3 },
  context: { module: 0, status: 'active', count: null, order: 1, photo: null },
})
const input: CaseInput = {
  features: model?.features ?? {},
  spec: specForEngine(model?.specSheet ?? null),
  job: { complaint: { words: 'Starts, dies', symptom: 'startsThenDies', lampOn: true } },
  entries: [code],
  meter: METER,
}
const means: Means = {
  bag: BAG,
  roles: ['mechanic'],
  minutesToLeaveBy: null,
  shop: {
    perMinuteMinor: SHOP.perMinuteMinor,
    towMinor: SHOP.towMinor,
    recoveryMinor: SHOP.recoveryMinor,
  },
  dark: false,
  people: 1,
}
const question: Question = {
  case: input,
  means: null,
  outlookOf: [{ kind: 'check', id: 'coilPrimaryResistance' }],
}

/** A worker that runs here, or fails in one of the ways workers do. */
class WorkerDouble extends EventTarget {
  readonly heard: ToWorker[] = []
  terminated = false
  readonly #mode: 'answers' | 'fails' | 'dies'
  constructor(mode: 'answers' | 'fails' | 'dies') {
    super()
    this.#mode = mode
  }
  postMessage(message: ToWorker): void {
    this.heard.push(message)
    if (message.kind === 'ask') queueMicrotask(() => this.#answer(message))
  }
  terminate(): void {
    this.terminated = true
  }
  #answer(message: ToWorker & { kind: 'ask' }): void {
    if (this.#mode === 'dies') {
      this.dispatchEvent(new Event('error'))
      return
    }
    const answer: FromWorker =
      this.#mode === 'fails'
        ? { kind: 'failed', id: message.id, words: 'no book' }
        : { kind: 'answer', id: message.id, answer: workOut(index, message.question) }
    this.dispatchEvent(new MessageEvent('message', { data: answer }))
  }
}
const clientWith = (double: WorkerDouble | null) =>
  new EngineClient(() => double as unknown as Worker | null)

describe('the engine beside the page', () => {
  const expected = workOut(index, question)

  it('[R5] gives the same answer in the worker, without workers, and after the worker died', async () => {
    for (const double of [new WorkerDouble('answers'), null, new WorkerDouble('dies')])
      expect(await clientWith(double).ask(index, question)).toEqual(expected)
  })

  it('answers on the page when the worker says that it could not', async () => {
    expect(await clientWith(new WorkerDouble('fails')).ask(index, question)).toEqual(expected)
  })

  it('sends the code book once and once more when it is another one', async () => {
    const double = new WorkerDouble('answers')
    const client = clientWith(double)
    await client.ask(index, question)
    await client.ask(index, question)
    await client.ask({ ...index, version: 2 }, question)
    expect(double.heard.map((message) => message.kind)).toEqual([
      'book',
      'ask',
      'ask',
      'book',
      'ask',
    ])
  })

  it('buries a dead worker and never asks it again', async () => {
    const double = new WorkerDouble('dies')
    const client = clientWith(double)
    await Promise.all([client.ask(index, question), client.ask(index, question)])
    expect(double.terminated).toBe(true)
    const before = double.heard.length
    await client.ask(index, question)
    expect(double.heard).toHaveLength(before)
  })

  it('knows two questions apart by what can change their answer', () => {
    const more = { ...question, case: { ...input, entries: [] } }
    expect(keyOf(question)).toBe(keyOf({ ...question, case: { ...input } }))
    expect(keyOf(more)).not.toBe(keyOf(question))
    expect(keyOf({ ...question, means })).not.toBe(keyOf(question))
  })
})

describe('advice that can be shown again', { timeout: 60_000 }, () => {
  const whole = { ...input, spec: model?.specSheet ?? null }
  const planned: Question = { case: input, means, outlookOf: [] }

  it('[R23] the cut spec sheet gives the same belief and plan as the whole one', () => {
    expect(workOut(index, planned)).toEqual(workOut(index, { ...planned, case: whole }))
  })

  it('[R23] recomputes to the same values from what was kept, and fits into one op', () => {
    const answer = workOut(index, planned)
    if (answer.plan === null) throw new Error('no plan')
    const kept = adviceOf({
      id: code.id,
      jobId: code.jobId,
      at: code.writtenAt,
      bookVersion: 1,
      case: input,
      means,
      answer,
      plan: answer.plan,
      chose: answer.plan.next.id,
      reason: null,
    })
    expect(kept.acted).toBe('followed')
    expect(JSON.stringify(kept).length).toBeLessThan(10_000)
    const read = JSON.parse(JSON.stringify(kept.inputs)) as AdviceInputs
    const again = workOut(index, {
      case: caseOfAdvice(read, [code]),
      means: read.means,
      outlookOf: [],
    })
    expect(again.plan?.next).toEqual((kept.shown as { next: unknown }).next)
    expect(
      again.belief.suspects.slice(0, 12).map(({ fault, chance }) => ({ fault, chance })),
    ).toEqual((kept.shown as { suspects: unknown }).suspects)
  })

  it('[R23] choosing another step is kept as overridden with its reason', () => {
    const answer = workOut(index, planned)
    if (answer.plan === null) throw new Error('no plan')
    const base = { id: code.id, jobId: code.jobId, at: code.writtenAt, bookVersion: 1 }
    const kept = adviceOf({
      ...base,
      case: input,
      means,
      answer,
      plan: answer.plan,
      chose: 'somethingOther',
      reason: 'it is raining',
    })
    expect([kept.acted, kept.chose, kept.reason]).toEqual([
      'overridden',
      'somethingOther',
      'it is raining',
    ])
  })
})

describe('an answer and what it was asked with', () => {
  const question: Question = { case: input, means, outlookOf: [] }
  const held = { key: 'old', question, answer: workOut(index, question) }

  it('[R23] an older answer goes with its own question, while a newer one is worked out or failed', () => {
    const working = engineView(held, 'new', null)
    expect(working).toMatchObject({ working: true, failed: false })
    expect(working.question).toBe(question)
    const failed = engineView(held, 'new', 'new')
    expect(failed).toMatchObject({ working: false, failed: true })
    expect([failed.question, failed.answer]).toEqual([question, held.answer])
  })

  it('[R23] what failed once and has its answer now is not failed', () => {
    expect(engineView(held, 'old', 'old')).toMatchObject({ working: false, failed: false })
    expect(engineView(held, 'old', 'new')).toMatchObject({ working: false, failed: false })
    expect(engineView(null, null, null)).toEqual({
      answer: null,
      question: null,
      working: false,
      failed: false,
    })
  })
})
