import type { BookIndex } from '@/lib/diag/book-index'
import type { Answer, Question } from './work'

export type ToWorker =
  | { kind: 'book'; version: number; index: BookIndex }
  | { kind: 'ask'; id: number; version: number; question: Question }

export type FromWorker =
  | { kind: 'answer'; id: number; answer: Answer }
  | { kind: 'failed'; id: number; words: string }
