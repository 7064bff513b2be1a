import type { BookIndex } from '@/lib/diag/book-index'
import { workOut } from './work'
import type { FromWorker, ToWorker } from './worker-messages'

/** The engine beside the page. Holds one code book at a time and answers questions in the order they come. */
let held: { version: number; index: BookIndex } | null = null

const say = (message: FromWorker): void => self.postMessage(message)

self.addEventListener('message', (event: MessageEvent<ToWorker>) => {
  const message = event.data
  if (message.kind === 'book') {
    held = { version: message.version, index: message.index }
    return
  }
  if (held?.version !== message.version) {
    say({ kind: 'failed', id: message.id, words: 'another code book' })
    return
  }
  try {
    say({ kind: 'answer', id: message.id, answer: workOut(held.index, message.question) })
  } catch (error) {
    say({ kind: 'failed', id: message.id, words: String(error) })
  }
})
