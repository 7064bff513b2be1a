import type { BookIndex } from '@/lib/diag/book-index'
import type { CheckItem } from '@/lib/model/code-book'
import type { LogEntry } from '@/lib/model/log-entry'
import { asTypedOnScreen } from '../reading-strip/figures'
import { verdictWords } from '../reading-strip/verdict'

/** Minor units in words of the currency: `135.00 USD`; yen and the like without decimals. */
export function moneyWords(minor: number, currency: string): string {
  const options = { style: 'currency', currency } as const
  const places =
    new Intl.NumberFormat('en-GB', options).resolvedOptions().maximumFractionDigits ?? 2
  const whole = (minor / 10 ** places).toLocaleString('en-GB', {
    minimumFractionDigits: places,
    maximumFractionDigits: places,
  })
  return `${whole.replace('-', '−')} ${currency}`
}

/** `4 min`; halves are kept, anything under a minute is `under 1 min`. */
export function minutesWords(minutes: number): string {
  if (minutes < 0.75) return 'under 1 min'
  if (minutes < 90) return `${Math.round(minutes)} min`
  const hours = Math.floor(minutes / 60)
  return `${hours} h ${String(Math.round(minutes - hours * 60)).padStart(2, '0')}`
}

export const MACHINE_STATE_WORDS: Record<CheckItem['machineState'], string> = {
  off: 'off, key out',
  keyOn: 'key on, engine off',
  cranking: 'cranking',
  runningNeutral: 'running in neutral',
  guardedStand: 'raised on a guarded stand',
}

export const LIGHT_WORDS: Record<CheckItem['light'], string> = {
  any: 'any light',
  lampEnough: 'a lamp is enough',
  daylight: 'daylight only',
}

/** The engine writes plain ASCII; the screen shows the signs. */
export const onScreen = (words: string): string =>
  words
    .replaceAll('+-', '±')
    .replace(/(\d) C\b/g, '$1 °C')
    .replace(/(^|[\s(])-(?=\d)/g, '$1−')

/** What an entry says in a few words, for "ruled out by ..." and "why". */
export function entryWords(entry: LogEntry, index: BookIndex): string {
  const { body } = entry
  switch (body.kind) {
    case 'check': {
      const check = index.checks.get(body.checkId)
      const outcome = check?.outcomes.find((one) => one.id === body.outcome)?.name ?? body.outcome
      return `${check?.name ?? body.checkId}: ${outcome}`
    }
    case 'reading':
      return readingWords(body, index)
    case 'swap':
      return `${index.swaps.get(body.swapId)?.name ?? body.swapId}: ${SWAP_WORDS[body.step]}, ${faultWords(body.faultPresent)}`
    case 'code':
      return `code ${codeWords(body.seen)}`
    case 'symptom':
      return index.symptoms.get(body.symptom)?.name ?? body.symptom
    case 'fix':
      return `fix: ${body.words}`
    case 'proofRun':
      return `proof run: ${body.starts} starts, ${body.faults} with the fault`
    default:
      return KIND_WORDS[body.kind]
  }
}

const readingWords = (body: Extract<LogEntry['body'], { kind: 'reading' }>, index: BookIndex) => {
  const name = index.checks.get(body.checkId)?.name ?? body.checkId
  const whose = body.subject === 'knownGood' ? ' on a known-good part' : ''
  const verdict = verdictWords(body.result?.verdict ?? null)
  return `${name}${whose}: ${asTypedOnScreen(body.asTyped)} ${body.unit}, ${verdict}`
}

const faultWords = (present: boolean | null): string =>
  present === null ? 'not tried' : present ? 'fault there' : 'fault gone'

const SWAP_WORDS = {
  spareFitted: 'spare fitted',
  oldRefitted: 'old part refitted',
  newFitted: 'new part fitted',
} as const

type Other = Exclude<
  LogEntry['body']['kind'],
  'check' | 'reading' | 'swap' | 'code' | 'symptom' | 'fix' | 'proofRun'
>
const KIND_WORDS: Record<Other, string> = {
  codesUnreadable: 'codes could not be read',
  codesCleared: 'codes cleared',
  couldNot: 'check not possible',
  photo: 'photo',
  note: 'note',
  people: 'people',
  wayOut: 'way out',
  correction: 'correction',
}

function codeWords(seen: Extract<LogEntry['body'], { kind: 'code' }>['seen']): string {
  switch (seen.format) {
    case 'spn':
      return `${seen.spn}/${seen.fmi}`
    case 'pcode':
      return seen.code
    case 'flash':
      return seen.pattern
    case 'asShown':
      return seen.text
  }
}
