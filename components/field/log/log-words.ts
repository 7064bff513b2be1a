import type { LogShape } from '@/components/ui/log-icon'
import { type BookIndex, wordName } from '@/lib/diag/book-index'
import { explainCode } from '@/lib/diag/code-words'
import type { LogBody, LogKind } from '@/lib/model/log-entry'
import { contextWords } from '../codes/context-words'
import { counted, MACHINE_WORDS, PEOPLE_WORDS, sentence, WAY_OUT_WORDS } from '../words'

/** Shape and word of each kind of entry: the word always stands beside the shape. */
const KINDS: Record<LogKind, { shape: LogShape; word: string }> = {
  symptom: { shape: 'triangle', word: 'Symptom' },
  code: { shape: 'diamond', word: 'Code' },
  codesUnreadable: { shape: 'diamond', word: 'Codes' },
  codesCleared: { shape: 'diamond', word: 'Codes' },
  check: { shape: 'gauge', word: 'Check' },
  couldNot: { shape: 'gauge', word: 'Check' },
  reading: { shape: 'gauge', word: 'Reading' },
  swap: { shape: 'hexagon', word: 'Swap' },
  fix: { shape: 'flag', word: 'Fix' },
  proofRun: { shape: 'flag', word: 'Proof run' },
  photo: { shape: 'frame', word: 'Photo' },
  note: { shape: 'ring', word: 'Note' },
  people: { shape: 'ring', word: 'People' },
  wayOut: { shape: 'flag', word: 'Way out' },
  correction: { shape: 'ring', word: 'Correction' },
}

export const kindWord = (kind: LogKind): string => KINDS[kind].word
export const shapeOf = (kind: LogKind): LogShape => KINDS[kind].shape

export type EntryWords = { title: string; second: string | null }
type Of<K extends LogKind> = Extract<LogBody, { kind: K }>
type Names = BookIndex | null

const CLEARED = {
  notYet: 'Not read again yet.',
  noneBack: 'Read again: none came back.',
  back: 'Read again: they came back.',
}
const STEP_WORDS = {
  spareFitted: 'Spare fitted',
  oldRefitted: 'Old part refitted',
  newFitted: 'New part fitted',
}
const FROM_WORDS = {
  bag: 'from the bag',
  twin: 'from a machine of the same model',
  shop: 'from the shop',
}

/** What one entry says, with the code book's names where the phone has them, else the book's own ids. */
export function entryWords(body: LogBody, index: Names): EntryWords {
  switch (body.kind) {
    case 'symptom':
      return symptomWords(body, index)
    case 'code':
      return codeWords(body, index)
    case 'codesUnreadable':
      return { title: 'Codes could not be read', second: body.reason }
    case 'codesCleared':
      return { title: 'Codes cleared', second: CLEARED[body.readAgain] }
    case 'check':
      return checkWords(body, index)
    case 'couldNot':
      return { title: `${checkName(body.checkId, index)}: could not`, second: body.reason }
    case 'reading':
      return readingWords(body, index)
    case 'swap':
      return swapWords(body, index)
    case 'fix':
      return fixWords(body, index)
    case 'proofRun':
      return proofWords(body)
    case 'photo':
      return { title: body.caption ?? 'Photo', second: null }
    case 'note':
      return { title: body.words, second: null }
    case 'people':
      return { title: `People: ${PEOPLE_WORDS[body.to].toLowerCase()}`, second: body.words }
    case 'wayOut':
      return wayOutWords(body)
    case 'correction':
      return { title: 'Correction', second: body.reason }
  }
}

const checkName = (id: string, index: Names): string => index?.checks.get(id)?.name ?? id

function symptomWords(body: Of<'symptom'>, index: Names): EntryWords {
  const item = index?.symptoms.get(body.symptom)
  const when = body.conditions.map((id) => item?.conditions.find((c) => c.id === id)?.name ?? id)
  const said = body.words === null ? '' : `“${body.words}” `
  return {
    title: item?.name ?? body.symptom,
    second: `${said}${when.join(', ')}`.trim() || null,
  }
}

function codeWords(body: Of<'code'>, index: Names): EntryWords {
  const context = contextWords(body.context)
  if (index === null) {
    return {
      title: body.seen.format === 'spn' ? `SPN ${body.seen.spn} FMI ${body.seen.fmi}` : 'Code',
      second: context,
    }
  }
  const words = explainCode(index, body.seen)
  const failure = words.failure === null ? '' : `: ${words.failure.name}`
  return { title: words.title, second: `${sentence(words.circuitName)}${failure}. ${context}` }
}

function checkWords(body: Of<'check'>, index: Names): EntryWords {
  const item = index?.checks.get(body.checkId)
  const outcome = item?.outcomes.find((o) => o.id === body.outcome)?.name ?? body.outcome
  return {
    title: `${item?.name ?? body.checkId}: ${outcome}`,
    second: body.asWritten ? null : `Done differently: ${body.differed ?? 'not said how'}`,
  }
}

function readingWords(body: Of<'reading'>, index: Names): EntryWords {
  return {
    title: checkName(body.checkId, index),
    second: [
      body.subject === 'knownGood' ? 'On a known-good part.' : '',
      body.result === null ? 'No limits known.' : '',
      body.nulled ? 'Leads nulled.' : '',
      `${body.meterName}.`,
    ]
      .filter(Boolean)
      .join(' '),
  }
}

function swapWords(body: Of<'swap'>, index: Names): EntryWords {
  const present = { true: 'fault there', false: 'fault gone', null: 'not tried' }[
    String(body.faultPresent) as 'true' | 'false' | 'null'
  ]
  const part = index?.swaps.get(body.swapId)
  const name =
    part === undefined || index === null ? body.swapId : wordName(index, 'part', part.part)
  return {
    title: `${STEP_WORDS[body.step]}: ${present}`,
    second: [name, FROM_WORDS[body.partFrom], body.partWords].filter(Boolean).join(', '),
  }
}

function fixWords(body: Of<'fix'>, index: Names): EntryWords {
  const fault = index?.faults.get(body.fault)?.name ?? body.fault
  const limit =
    body.temporary === null
      ? ''
      : ` Temporary: ${body.temporary.limit}. To undo: ${body.temporary.undo}.`
  return { title: body.words, second: `${fault}.${limit}` }
}

function proofWords(body: Of<'proofRun'>): EntryWords {
  const runs = `${counted(body.starts, 'start')}, ${body.minutes} min`
  const bound =
    body.boundExact === null
      ? ''
      : ` Up to ${Math.round(body.boundExact * 100)} of 100 starts could still show it (one-sided 95 %).`
  return {
    title:
      body.faults === 0
        ? `${runs} without the fault`
        : `${runs}, the fault ${counted(body.faults, 'time')}`,
    second: `${body.hot ? 'Hot.' : 'Not hot.'}${bound} ${body.words ?? ''}`.trim(),
  }
}

function wayOutWords(body: Of<'wayOut'>): EntryWords {
  return {
    title: WAY_OUT_WORDS[body.wayOut],
    second: `${body.reasons} People: ${PEOPLE_WORDS[body.peopleState].toLowerCase()}. Machine: ${MACHINE_WORDS[body.machineState].toLowerCase()}.`,
  }
}
