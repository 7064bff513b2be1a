/**
 * Causes that set several codes at once (rule R11): what leads to each, what it can set besides, and where to look
 * first. Circuits, groups and failure kinds are those of the code book; which cause can set which is a table of
 * our own (common practice, no source). Sensors run on the 5 V rail, the rail and the modules on the supply.
 */
import type { CodeMeaning } from './code-words'
import { PRACTICE_SOURCE } from './practice-limits'

/** In the order in which they are looked at: each can set what comes after it. */
export const COMMON_CAUSES = ['lowSupply', 'sensorSupply', 'network', 'ground'] as const
/** One of the causes that set several codes at once. */
export type CommonCause = (typeof COMMON_CAUSES)[number]

/** A code as the causes see it; nulls where the book is silent. */
export type CodeFacts = {
  title: string
  circuit: string | null
  group: string | null
  kind: string | null
  isNetworkCode: boolean
}

type CauseRow = {
  name: string
  /** Where to look first, cheapest and safest first. */
  lookFirst: string
  /** What the leading code does not convict. */
  doesNotProve: string
  source: string
  leads: (code: CodeFacts) => boolean
  canSet: (code: CodeFacts) => boolean
}

const oneOf =
  (...words: string[]) =>
  (word: string | null): boolean =>
    word !== null && words.includes(word)

const tooLow = oneOf('voltLow', 'lowSevere', 'lowModerate', 'lowMild', 'low', 'tooLow', 'driftLow')
const unsteady = oneOf(
  'erratic',
  'intermittent',
  'rateOfChange',
  'condition',
  'circuit',
  'noSignal',
)
const fromTheNet = oneOf('networkError', 'updateRate')
const offScale = oneOf('voltLow', 'voltHigh', 'low', 'high', 'range')
const lifted = oneOf('voltHigh', 'high', 'erratic', 'intermittent', 'range')
const onTheRail = oneOf(
  'throttleSensor',
  'mapSensor',
  'fuelPressure',
  'coolantTempSensor',
  'gripSensor',
  'airTempSensor',
  'oilPressure',
)
const railGroups = oneOf('air', 'oil', 'cooling')
/** Coils, injectors, motors and relays: they live on the battery's volts. */
const runOnSupply = oneOf(
  'fuelPump',
  'idleAir',
  'mainRelay',
  'throttleActuator',
  'oxygenHeater',
  'starterCircuit',
  'fanControl',
  'fourWheelActuator',
  'steeringAssistMotor',
)
const fedBySupply = (circuit: string | null): boolean =>
  runOnSupply(circuit) || (circuit !== null && /^(ignitionCoil|injector)\d$/.test(circuit))

/** The causes by name. */
export const CAUSES: Readonly<Record<CommonCause, CauseRow>> = {
  lowSupply: {
    name: 'Low supply',
    lookFirst:
      'Battery volts at rest and while cranking, the battery posts, the main fuse and the ground straps; then the charging volts.',
    doesNotProve:
      'does not convict the battery: a poor post, a ground, a fuse or no charge lowers the same volts.',
    source: PRACTICE_SOURCE,
    leads: ({ circuit, kind }) =>
      (circuit === 'systemVoltage' && (tooLow(kind) || unsteady(kind))) ||
      (circuit === 'chargingSystem' && tooLow(kind)) ||
      (circuit === 'mainRelay' && (tooLow(kind) || unsteady(kind) || kind === 'currentLow')),
    canSet: ({ circuit, group, kind, isNetworkCode }) =>
      (oneOf('sensorSupply', 'controlModule')(circuit) && (tooLow(kind) || unsteady(kind))) ||
      (fedBySupply(circuit) && (tooLow(kind) || unsteady(kind) || kind === 'currentLow')) ||
      fromTheNet(kind) ||
      group === 'network' ||
      isNetworkCode,
  },
  sensorSupply: {
    name: '5 V sensor supply',
    lookFirst:
      'Volts between the 5 V pin and sensor ground at one sensor, 4.9 to 5.1 V; when they are off, unplug the sensors on that supply one at a time until they come back.',
    doesNotProve:
      'does not convict the module: one shorted sensor or a chafed wire pulls the supply of all down.',
    source: PRACTICE_SOURCE,
    leads: ({ circuit }) => circuit === 'sensorSupply',
    canSet: ({ circuit, group, kind }) =>
      (onTheRail(circuit) || (circuit === null && railGroups(group))) &&
      (offScale(kind) || unsteady(kind)),
  },
  network: {
    name: 'Network between modules',
    lookFirst:
      'Power and ground at each module that is silent, then the plugs, then the ohms across the pair with the key off: about 60.',
    doesNotProve:
      'does not convict a module: one that has no power or a loose plug is missed by the others in the same way.',
    source: PRACTICE_SOURCE,
    leads: ({ circuit, group, isNetworkCode }) =>
      circuit === 'network' || group === 'network' || isNetworkCode,
    canSet: ({ kind }) => fromTheNet(kind),
  },
  ground: {
    name: 'Shared ground',
    lookFirst:
      'Volts from battery minus to engine, to frame and to the ground pin of one of these sensors while cranking or with loads on: 0.1 V at most, 0.05 V at a sensor.',
    doesNotProve: 'A lost ground lifts every signal that returns through it, and no code names it.',
    source: PRACTICE_SOURCE,
    leads: () => false,
    canSet: ({ circuit, kind }) =>
      lifted(kind) && !oneOf('systemVoltage', 'mainRelay')(circuit) && !fedBySupply(circuit),
  },
}

/** So many different circuits off at once, with no code for a shared supply, point to a shared ground (guess). */
export const GROUND_CIRCUITS = 3

/** What the causes ask of a code's meaning, with the group the book puts its number in. */
export const factsOf = (
  meaning: CodeMeaning,
  { group, isNetworkCode }: Pick<CodeFacts, 'group' | 'isNetworkCode'>,
): CodeFacts => ({
  title: meaning.title,
  circuit: meaning.circuit,
  group,
  kind: meaning.failure?.failure ?? null,
  isNetworkCode,
})
