/**
 * What an entry of the job log says, for the phone and the desk alike. Names come from the code book;
 * without one, or for an id it does not know, the id stands for itself.
 */
import { type BookIndex, wordName } from '@/lib/diag/book-index'
import { codeAsShown, explainCode } from '@/lib/diag/code-words'
import type { LogBody, LogKind } from '@/lib/model/log-entry'
import { assertNever } from '@/lib/model/result'
import { seconds } from '../field/times'
import { counted, MACHINE_WORDS, PEOPLE_WORDS, sentence, WAY_OUT_WORDS } from '../field/words'
import { asTypedOnScreen } from '../reading-strip/figures'
import { unitLabel } from '../reading-strip/unit-words'
import { verdictWords } from '../reading-strip/verdict'
import type { LogShape } from '../ui/log-icon'
import { codeMeans, contextWords } from './code-sentences'

/** An entry as it is shown: the shape and the word of its kind, a title, and what is said under it. */
export type EntryWords = { shape: LogShape; kind: string; title: string; lines: string[] }

type Said = Pick<EntryWords, 'title' | 'lines'>
type Book = BookIndex | null
type Of<K extends LogKind> = Extract<LogBody, { kind: K }>

/** Shape and word of each kind: the word always stands beside the shape. */
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
  voice: { shape: 'frame', word: 'Voice note' },
  note: { shape: 'ring', word: 'Note' },
  people: { shape: 'ring', word: 'People' },
  wayOut: { shape: 'flag', word: 'Way out' },
  correction: { shape: 'ring', word: 'Correction' },
}

const READ_AGAIN = {
  notYet: 'Not read again yet.',
  noneBack: 'Read again: none came back.',
  back: 'Read again: codes came back.',
}
const STEPS = {
  spareFitted: 'Spare fitted',
  oldRefitted: 'Old part refitted',
  newFitted: 'New part fitted',
}
const PART_FROM = {
  bag: 'from the bag',
  twin: 'from a machine of the same model',
  shop: 'from the shop',
}

/** What an entry says, whole. */
export function entryWords(body: LogBody, book: Book): EntryWords {
  return { shape: KINDS[body.kind].shape, kind: kindWord(body), ...said(body, book) }
}

/** The word of a kind by its name; undefined for one this version does not know. */
export const kindName = (kind: string): string | undefined =>
  Object.hasOwn(KINDS, kind) ? KINDS[kind as LogKind].word : undefined

/** The word of its kind; a fix that holds only for a while is a temporary measure. */
export const kindWord = (body: LogBody): string =>
  body.kind === 'fix' && body.temporary !== null ? 'Temporary measure' : KINDS[body.kind].word

/** What an entry says inside another sentence: "ruled out by ...", "why", "taken back". */
export function entryMention(body: LogBody, book: Book): string {
  switch (body.kind) {
    case 'reading': {
      const whose = body.subject === 'knownGood' ? ' on a known-good part' : ''
      const figure = `${body.overRange ? 'over ' : ''}${asTypedOnScreen(body.asTyped)} ${unitLabel(body.quantity, body.unit)}`
      const verdict = verdictWords(body.result?.verdict ?? null)
      return `${checkName(body.checkId, book)}${whose}: ${figure}, ${verdict}`
    }
    case 'swap': {
      const name = book?.swaps.get(body.swapId)?.name ?? body.swapId
      return `${name}: ${STEPS[body.step].toLowerCase()}, ${faultAfter(body)}`
    }
    case 'code':
      return body.seen.format === 'asShown' ? `code ${body.seen.text}` : codeAsShown(body.seen)
    case 'fix':
    case 'proofRun':
      return `${kindWord(body).toLowerCase()}: ${said(body, book).title}`
    default:
      return said(body, book).title
  }
}

function said(body: LogBody, book: Book): Said {
  switch (body.kind) {
    case 'symptom':
      return symptom(body, book)
    case 'code':
      return code(body, book)
    case 'codesUnreadable':
      return say('Codes could not be read', body.reason)
    case 'codesCleared':
      return say('Codes cleared', READ_AGAIN[body.readAgain])
    case 'check':
      return check(body, book)
    case 'couldNot':
      return say(`${checkName(body.checkId, book)}: could not`, body.reason)
    case 'reading':
      return reading(body, book)
    case 'swap':
      return swap(body, book)
    case 'fix':
      return fix(body, book)
    case 'proofRun':
      return proofRun(body)
    case 'photo':
      return say(body.caption ?? 'Photo')
    case 'voice':
      return say(body.caption ?? 'Voice note', `${seconds(body.voice.seconds)}.`)
    case 'note':
      return say(body.words)
    case 'people':
      return say(`People: ${PEOPLE_WORDS[body.to].toLowerCase()}`, body.words)
    case 'wayOut':
      return wayOut(body)
    case 'correction':
      return say('Correction', body.reason)
    default:
      return assertNever(body)
  }
}

/** A title and the lines there are. */
const say = (title: string, ...lines: (string | null)[]): Said => ({
  title,
  lines: lines.filter((line): line is string => line !== null && line !== ''),
})

const checkName = (id: string, book: Book): string => book?.checks.get(id)?.name ?? id

function symptom(body: Of<'symptom'>, book: Book): Said {
  const item = book?.symptoms.get(body.symptom)
  const when = body.conditions.map((id) => item?.conditions.find((c) => c.id === id)?.name ?? id)
  const listed = sentence(when.map(lowerFirst).join(', '))
  return say(
    item?.name ?? body.symptom,
    body.words === null ? null : `“${body.words}”`,
    listed === '' ? null : `${listed}.`,
  )
}

const lowerFirst = (text: string): string => `${text.charAt(0).toLowerCase()}${text.slice(1)}`

const code = (body: Of<'code'>, book: Book): Said =>
  say(
    codeAsShown(body.seen),
    book === null ? null : codeMeans(explainCode(book, body.seen)),
    contextWords(body.context),
  )

function check(body: Of<'check'>, book: Book): Said {
  const found = book?.checks.get(body.checkId)?.outcomes.find(({ id }) => id === body.outcome)
  return say(
    `${checkName(body.checkId, book)}: ${found?.name ?? body.outcome}`,
    found === undefined ? null : found.good ? 'Counts as good.' : 'Counts as bad.',
    body.asWritten ? null : `Done differently: ${body.differed || 'not said how'}`,
  )
}

function reading(body: Of<'reading'>, book: Book): Said {
  const leads = body.nulled ? ', leads nulled' : ', leads not nulled'
  return say(
    checkName(body.checkId, book),
    body.subject === 'knownGood' ? 'On a known-good part.' : null,
    `${body.meterName}${body.quantity === 'resistance' ? leads : ''}.`,
  )
}

const faultAfter = ({ faultPresent }: Of<'swap'>): string =>
  faultPresent === null ? 'not tried' : faultPresent ? 'fault there' : 'fault gone'

/** Where the part came from is said of the good part, not of the old one. */
function swap(body: Of<'swap'>, book: Book): Said {
  const item = book?.swaps.get(body.swapId)
  const part = item && book ? wordName(book, 'part', item.part) : body.swapId
  const from = body.step === 'oldRefitted' ? '' : `, ${PART_FROM[body.partFrom]}`
  const words = body.partWords ? `, ${body.partWords}` : ''
  return say(`${STEPS[body.step]}: ${faultAfter(body)}`, `${part}${from}${words}.`)
}

function fix(body: Of<'fix'>, book: Book): Said {
  const { temporary } = body
  return say(
    body.words,
    `${book?.faults.get(body.fault)?.name ?? body.fault}.`,
    temporary && `Temporary measure. Limit: ${stop(temporary.limit)}`,
    temporary && `To undo: ${stop(temporary.undo)}`,
  )
}

/** Ends a typed sentence with a full stop, unless it has an end. */
const stop = (text: string): string => (/[.!?]$/.test(text) ? text : `${text}.`)

function proofRun(body: Of<'proofRun'>): Said {
  const runs = `${counted(body.starts, 'start')}, ${body.minutes} min`
  const times = body.faults === 1 ? 'once' : `${body.faults} times`
  return say(
    body.faults === 0 ? `${runs} without the fault` : `${runs}, the fault came ${times}`,
    body.hot ? 'Hot.' : 'Not hot.',
    body.boundExact === null
      ? null
      : `Up to ${Math.round(body.boundExact * 100)} of 100 starts could still show it (one-sided 95 %).`,
    body.words,
  )
}

function wayOut(body: Of<'wayOut'>): Said {
  const people = `People: ${PEOPLE_WORDS[body.peopleState].toLowerCase()}.`
  const machine = `Machine: ${MACHINE_WORDS[body.machineState].toLowerCase()}.`
  return say(WAY_OUT_WORDS[body.wayOut], body.reasons, `${people} ${machine}`)
}
