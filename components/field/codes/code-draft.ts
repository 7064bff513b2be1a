import type { CodeContext, CodeSeen } from '@/lib/model/code-seen'
import { fail, ok, type Result } from '@/lib/model/result'

/** A code while it is being taken down: what is typed, as typed. */
export const CODE_FORMATS = ['spn', 'pcode', 'flash', 'asShown', 'unreadable'] as const
export type CodeFormat = (typeof CODE_FORMATS)[number]

export type CodeDraft = {
  format: CodeFormat
  module: string
  spn: string
  fmi: string
  pcode: string
  flash: string
  flashAgain: string
  text: string
  reason: string
  status: CodeContext['status'] | null
  count: string
  /** Hash of the photo of the dash, recorded already. */
  photo: string | null
}

export const EMPTY_CODE: CodeDraft = {
  format: 'spn',
  module: '',
  spn: '',
  fmi: '',
  pcode: '',
  flash: '',
  flashAgain: '',
  text: '',
  reason: '',
  status: null,
  count: '',
  photo: null,
}

/** Under which the half-typed code of a job is kept. */
export const codeKey = (jobId: string): string => `job.${jobId}.code`

/** Which box is wrong and what it wants. */
export type CodeProblem = { field: keyof CodeDraft; words: string }

/** Whole number from 0 to `most`; empty answers null where that is allowed. */
function whole(text: string, most: number): number | null {
  const plain = text.trim()
  return /^\d{1,7}$/.test(plain) && Number(plain) <= most ? Number(plain) : null
}

/** The code as the dash showed it, or the first box that is wrong. Nothing is corrected or guessed. */
export function seenOf(draft: CodeDraft): Result<CodeSeen, CodeProblem> {
  switch (draft.format) {
    case 'spn':
      return spnOf(draft)
    case 'pcode': {
      const code = draft.pcode.trim().toUpperCase()
      return /^[PCBU][0-3][0-9A-F]{3}$/.test(code)
        ? ok({ format: 'pcode', code })
        : fail({ field: 'pcode', words: 'One letter of P, C, B, U and four digits, like P0351.' })
    }
    case 'flash':
      return flashOf(draft)
    case 'asShown':
    case 'unreadable': {
      const text = draft.text.trim()
      return text === ''
        ? fail({ field: 'text', words: 'Type it letter by letter as it stands there.' })
        : ok({ format: 'asShown', text })
    }
  }
}

function spnOf(draft: CodeDraft): Result<CodeSeen, CodeProblem> {
  const spn = whole(draft.spn, 524_287)
  if (spn === null) {
    return fail({ field: 'spn', words: 'A whole number from 0 to 524287.' })
  }
  const fmi = whole(draft.fmi, 31)
  if (fmi === null) {
    return fail({ field: 'fmi', words: 'A whole number from 0 to 31.' })
  }
  return ok({ format: 'spn', spn, fmi })
}

const pattern = (text: string): string =>
  text
    .trim()
    .replace(/[^0-9]+/g, '-')
    .replace(/^-|-$/g, '')

/** Flashes count only when the same pattern was seen twice (rule R11). */
function flashOf(draft: CodeDraft): Result<CodeSeen, CodeProblem> {
  const first = pattern(draft.flash)
  if (!/^\d{1,2}(-\d{1,2}){0,4}$/.test(first)) {
    return fail({ field: 'flash', words: 'Groups of flashes with a dash between, like 2-4.' })
  }
  return pattern(draft.flashAgain) === first
    ? ok({ format: 'flash', pattern: first })
    : fail({
        field: 'flashAgain',
        words: 'Not the same as the first time. Watch it again until two repeats match.',
      })
}

/** Where and how the code stood; `order` is its place on the screen, from 1. */
export function contextOf(draft: CodeDraft, order: number): Result<CodeContext, CodeProblem> {
  const module = whole(draft.module, 255)
  if (draft.module.trim() !== '' && module === null) {
    return fail({ field: 'module', words: 'A whole number from 0 to 255, or nothing.' })
  }
  const count = whole(draft.count, 126)
  if (draft.count.trim() !== '' && count === null) {
    return fail({ field: 'count', words: 'A whole number from 0 to 126, or nothing.' })
  }
  return draft.status === null
    ? fail({ field: 'status', words: 'Say whether it was shown as active or stored.' })
    : ok({ module, status: draft.status, count, order, photo: draft.photo })
}
