import type { BookIndex } from '@/lib/diag/book-index'
import { AppError } from '@/lib/model/result'
import type { Answer, Question } from './work'
import type { FromWorker, ToWorker } from './worker-messages'

type Waiting = {
  resolve: (answer: Answer | PromiseLike<Answer>) => void
  question: Question
  index: BookIndex
}

/**
 * The page's end of the engine. Choice: one worker for the whole page, one code book in it; when
 * there are no workers, or the worker dies, the same function runs on the page in a task of its own,
 * so that an answer always comes.
 */
export class EngineClient {
  #worker: Worker | null = null
  #dead = false
  #sent: BookIndex | null = null
  #nextId = 1
  readonly #waiting = new Map<number, Waiting>()
  readonly #makeWorker: () => Worker | null

  constructor(makeWorker: () => Worker | null = newWorker) {
    this.#makeWorker = makeWorker
  }

  /** The engine's answer; rejects with AppError `engineFailed` when the arithmetic itself breaks. */
  ask(index: BookIndex, question: Question): Promise<Answer> {
    const worker = this.#open()
    if (worker === null) return onPage(index, question)
    if (this.#sent !== index) {
      post(worker, { kind: 'book', version: index.version, index })
      this.#sent = index
    }
    const id = this.#nextId++
    return new Promise((resolve) => {
      this.#waiting.set(id, { resolve, question, index })
      post(worker, { kind: 'ask', id, version: index.version, question })
    })
  }

  #open(): Worker | null {
    if (this.#worker !== null || this.#dead) return this.#worker
    this.#worker = this.#makeWorker()
    if (this.#worker === null) {
      this.#dead = true
      return null
    }
    this.#worker.addEventListener('message', (event: MessageEvent<FromWorker>) =>
      this.#hear(event.data),
    )
    this.#worker.addEventListener('error', () => this.#bury())
    this.#worker.addEventListener('messageerror', () => this.#bury())
    return this.#worker
  }

  #hear(message: FromWorker): void {
    const waiting = this.#waiting.get(message.id)
    if (waiting === undefined) return
    this.#waiting.delete(message.id)
    if (message.kind === 'answer') waiting.resolve(message.answer)
    // The page tries once itself: a fault of the worker is then told from a fault of the sums.
    else waiting.resolve(onPage(waiting.index, waiting.question))
  }

  #bury(): void {
    this.#worker?.terminate()
    this.#worker = null
    this.#dead = true
    const left = [...this.#waiting.values()]
    this.#waiting.clear()
    for (const { resolve, index, question } of left) resolve(onPage(index, question))
  }
}

const post = (worker: Worker, message: ToWorker): void => worker.postMessage(message)

/** Lets the page draw first; the engine itself is only fetched when the worker could not be had. */
async function onPage(index: BookIndex, question: Question): Promise<Answer> {
  const { workOut } = await import('./work')
  await new Promise((resolve) => setTimeout(resolve, 0))
  try {
    return workOut(index, question)
  } catch (cause) {
    throw new AppError('engineFailed', { cause })
  }
}

function newWorker(): Worker | null {
  if (typeof Worker === 'undefined') return null
  try {
    return new Worker(new URL('./engine.worker.ts', import.meta.url), { type: 'module' })
  } catch {
    return null
  }
}

/** The one engine of this page. */
export const engine = new EngineClient()
