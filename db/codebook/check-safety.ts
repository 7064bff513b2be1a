import type { Caution, CheckItem, SwapItem } from '@/lib/model/code-book'
import type { BookProblem, Books } from './book-problem'

type Rule = {
  name: string
  applies: (check: CheckItem, fuelFaults: ReadonlySet<string>) => boolean
  signals: readonly Caution['signal'][]
  says: RegExp
}

const SEVERE = ['DANGER', 'WARNING'] as const
const FUEL_OPEN = ['railRelieved', 'gaugeInLine', 'carburettorOff']
const FUEL_TOOLS = ['jar', 'fuelCan', 'fuelGauge']

const turns = (check: CheckItem): boolean => !['off', 'keyOn'].includes(check.machineState)
const textOf = (check: CheckItem): string => check.steps.map((s) => s.text).join(' ')

/** Where a caution has to stand (rule R24; signal words ANSI Z535.6). */
const RULES: readonly Rule[] = [
  {
    name: 'an engine that turns or may move the machine',
    applies: (c) => turns(c) || c.mayMoveMachine,
    signals: SEVERE,
    says: /neutral|brake on|jump|gear/i,
  },
  {
    name: 'a running engine',
    applies: (c) => c.machineState === 'runningNeutral' || c.machineState === 'guardedStand',
    signals: ['DANGER'],
    says: /exhaust gas/i,
  },
  {
    name: 'fuel opened',
    applies: (c) =>
      c.setups.some((s) => FUEL_OPEN.includes(s)) ||
      c.tools.some((t) => FUEL_TOOLS.includes(t.tool)),
    signals: ['DANGER'],
    says: /petrol|fuel/i,
  },
  {
    name: 'power on close to fuel',
    applies: (c, fuel) =>
      c.machineState !== 'off' &&
      (c.setups.includes('tankCoverOff') || /\b(hose|injector|tank)\b/i.test(textOf(c))) &&
      Object.keys(c.table).some((fault) => fuel.has(fault)),
    signals: SEVERE,
    says: /petrol|fuel/i,
  },
  {
    name: 'high voltage',
    applies: (c) => c.machineState !== 'off' && /\b(coil|spark|lead and cap)\b/i.test(textOf(c)),
    signals: SEVERE,
    says: /high voltage/i,
  },
  {
    name: 'a battery',
    applies: (c) => c.reading?.component === 'batteryMain',
    signals: ['DANGER'],
    says: /battery/i,
  },
]

/** [CB13] [CB14] [CB18] Cautions that are missing, checks a guide may not do, and checks one person cannot. */
export function checkSafety({ shelf }: Books): BookProblem[] {
  const fuel = new Set(shelf.fault.filter((f) => f.system === 'fuelSystem').map((f) => f.id))
  return [
    ...shelf.check.flatMap((check) => [
      ...missing(check, fuel),
      ...states(check),
      ...guide(check),
      ...people(check),
    ]),
    ...shelf.swap.flatMap(swapSafety),
  ]
}

const cautionsOf = (item: CheckItem | SwapItem): Caution[] => [
  ...item.cautions,
  ...item.steps.flatMap((s) => (s.caution === null ? [] : [s.caution])),
]

function missing(check: CheckItem, fuel: ReadonlySet<string>): BookProblem[] {
  const cautions = cautionsOf(check)
  return RULES.filter(
    (rule) =>
      rule.applies(check, fuel) &&
      !cautions.some((c) => rule.signals.includes(c.signal) && rule.says.test(c.text)),
  ).map((rule) => ({
    kind: 'caution',
    id: check.id,
    words: `no ${rule.signals.join(' or ')} for ${rule.name}`,
  }))
}

function states(check: CheckItem): BookProblem[] {
  return turns(check) && !check.mayMoveMachine
    ? [{ kind: 'caution', id: check.id, words: 'the engine turns, so it may move the machine' }]
    : []
}

const NOT_FOR_GUIDES = [...FUEL_OPEN, 'modulePlugOff', 'valveCoverOff']

function guide(check: CheckItem): BookProblem[] {
  const found: string[] = []
  if (check.guideSafe !== check.roles.includes('guide'))
    found.push('guide-safe and the roles do not agree')
  if (check.guideSafe) {
    if (check.setups.some((s) => NOT_FOR_GUIDES.includes(s))) found.push('opens fuel or the module')
    if (check.tools.some((t) => FUEL_TOOLS.includes(t.tool))) found.push('handles fuel')
    if (check.machineState === 'guardedStand') found.push('raises the drive')
    if (cautionsOf(check).some((c) => /high voltage|under pressure/i.test(c.text)))
      found.push('has high voltage or pressure')
  }
  return found.map((words) => ({ kind: 'guideSafe', id: check.id, words }))
}

function people(check: CheckItem): BookProblem[] {
  return check.people === 2 && check.onePersonWay === null
    ? [{ kind: 'people', id: check.id, words: 'needs two, and the one-person way is not said' }]
    : []
}

function swapSafety(swap: SwapItem): BookProblem[] {
  const cautions = cautionsOf(swap)
  const starts = swap.steps.some((s) => /\bstart it\b/i.test(s.text))
  const warned = cautions.some((c) => c.signal === 'WARNING' && /neutral/i.test(c.text))
  const found: BookProblem[] = []
  if (starts && !warned)
    found.push({
      kind: 'caution',
      id: swap.id,
      words: 'starts the engine without a WARNING that it may move',
    })
  if (swap.guideSafe && cautions.some((c) => /high voltage|under pressure/i.test(c.text)))
    found.push({ kind: 'guideSafe', id: swap.id, words: 'has high voltage or pressure' })
  return found
}
