import type { LogShape } from '@/components/ui/log-icon'
import type { CodeSeen } from '@/lib/model/code-seen'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { assertNever } from '@/lib/model/result'
import { MACHINE_WORDS, PEOPLE_WORDS, WAY_OUT_WORDS } from '../../field/words'

/** Looks up the code book's names; an id the book does not know answers itself. */
export type BookNames = {
  symptom(id: string): string
  check(id: string): string
  /** The outcome's own name and whether it is the good one (null: not known). */
  outcome(checkId: string, outcome: string): { name: string; good: boolean | null }
  swap(id: string): string
  fault(id: string): string
  code(seen: CodeSeen): string | null
}

/** A log entry as a line: the shape and the word for its kind, a title, and what is said under it. */
export type TellingLine = { shape: LogShape; kind: string; title: string; lines: string[] }

const SWAP_WORDS = {
  spareFitted: 'Spare fitted',
  oldRefitted: 'Old part refitted',
  newFitted: 'New part fitted',
}
const FROM_WORDS = {
  bag: 'from the bag',
  twin: 'borrowed from another machine',
  shop: 'from the shop',
}
const BACK_WORDS = {
  noneBack: 'Read again: none came back.',
  back: 'Read again: codes came back.',
  notYet: 'Not read again yet.',
}
const STATUS_WORDS = { active: 'active', stored: 'stored', unknown: 'active or stored not shown' }

/** The code as the dash showed it. */
export function codeAsShown(seen: CodeSeen): string {
  switch (seen.format) {
    case 'spn':
      return `SPN ${seen.spn} / FMI ${seen.fmi}`
    case 'pcode':
      return seen.code
    case 'flash':
      return `Flash ${seen.pattern}`
    case 'asShown':
      return seen.text
    default:
      return assertNever(seen)
  }
}

const some = (...lines: (string | null | undefined | false)[]) =>
  lines.filter((line): line is string => Boolean(line))

type Of<K extends LogBody['kind']> = Extract<LogBody, { kind: K }>

function tellCode(body: Of<'code'>, names: BookNames): TellingLine {
  const { module, status, count } = body.context
  const where = some(
    module !== null && `module ${module}`,
    STATUS_WORDS[status],
    count !== null && `count ${count}`,
  ).join(', ')
  return {
    shape: 'diamond',
    kind: 'Code',
    title: codeAsShown(body.seen),
    lines: some(names.code(body.seen), `${where.slice(0, 1).toUpperCase()}${where.slice(1)}.`),
  }
}

function tellSwap(body: Of<'swap'>, names: BookNames): TellingLine {
  const result =
    body.faultPresent === null ? 'not tried' : body.faultPresent ? 'fault there' : 'fault gone'
  return {
    shape: 'hexagon',
    kind: 'Swap',
    title: `${SWAP_WORDS[body.step]}: ${result}`,
    lines: some(`${names.swap(body.swapId)}, part ${FROM_WORDS[body.partFrom]}.`, body.partWords),
  }
}

function tellCheck(body: Of<'check'>, names: BookNames): TellingLine {
  const outcome = names.outcome(body.checkId, body.outcome)
  return {
    shape: 'gauge',
    kind: 'Check',
    title: names.check(body.checkId),
    lines: some(
      `${outcome.name}${outcome.good === null ? '' : outcome.good ? ', good' : ', bad'}.`,
      body.asWritten ? null : `Not as written${body.differed ? `: ${body.differed}` : '.'}`,
    ),
  }
}

function tellProof(body: Of<'proofRun'>): TellingLine {
  const bound =
    body.boundExact === null
      ? null
      : `Up to ${Math.round(body.boundExact * 100)} of 100 starts could still fail (one-sided 95 %).`
  return {
    shape: 'flag',
    kind: 'Proof run',
    title: `${body.starts} starts, ${body.minutes} min, ${body.faults === 0 ? 'no fault' : `${body.faults} with the fault`}`,
    lines: some(body.hot ? 'Hot.' : 'Cold.', bound, body.words),
  }
}

function tellReading(body: Of<'reading'>, names: BookNames): TellingLine {
  const whose = body.subject === 'knownGood' ? 'On a known-good part.' : null
  return {
    shape: 'gauge',
    kind: 'Reading',
    title: names.check(body.checkId),
    lines: some(whose, `${body.meterName}, ${body.nulled ? 'leads nulled' : 'leads not nulled'}.`),
  }
}

const note = (shape: LogShape, kind: string, title: string, ...lines: (string | null)[]) => ({
  shape,
  kind,
  title,
  lines: some(...lines),
})

/** What the job log's line says. `knows` names what the entry refers to by id. */
export function tellEntry(entry: LogEntry, names: BookNames): TellingLine {
  const { body } = entry
  switch (body.kind) {
    case 'symptom':
      return note('triangle', 'Symptom', names.symptom(body.symptom), body.words)
    case 'code':
      return tellCode(body, names)
    case 'codesUnreadable':
      return note('diamond', 'Code', 'Codes could not be read', body.reason)
    case 'codesCleared':
      return note('diamond', 'Code', 'Codes cleared', BACK_WORDS[body.readAgain])
    case 'check':
      return tellCheck(body, names)
    case 'couldNot':
      return note('gauge', 'Check', names.check(body.checkId), `Could not: ${body.reason}`)
    case 'reading':
      return tellReading(body, names)
    case 'swap':
      return tellSwap(body, names)
    case 'fix':
      return note(
        'flag',
        body.temporary ? 'Temporary measure' : 'Fix',
        names.fault(body.fault),
        body.words,
        body.temporary && `Limit: ${body.temporary.limit}. To undo: ${body.temporary.undo}`,
      )
    case 'proofRun':
      return tellProof(body)
    case 'photo':
      return note('frame', 'Photo', body.caption ?? 'Photo')
    case 'note':
      return note('ring', 'Note', body.words)
    case 'people':
      return note('ring', 'People', PEOPLE_WORDS[body.to], body.words)
    case 'wayOut':
      return note(
        'flag',
        'Way out',
        WAY_OUT_WORDS[body.wayOut],
        body.reasons,
        `Machine ${MACHINE_WORDS[body.machineState].toLowerCase()}, people ${PEOPLE_WORDS[body.peopleState].toLowerCase()}.`,
      )
    case 'correction':
      return note('ring', 'Correction', body.reason)
    default:
      return assertNever(body)
  }
}
