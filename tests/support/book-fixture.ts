// The smallest code book that the checker finds nothing wrong with.
import type {
  CheckItem,
  CodeBookItem,
  FailureItem,
  FaultItem,
  FeatureItem,
} from '@/lib/model/code-book'
import { FEATURE_NAMES, FEATURES } from '@/lib/model/features'

const source = 'common practice, no source'

const fault = (id: string, name: string, of100: number): FaultItem => ({
  kind: 'fault',
  id,
  name,
  system: 'spark',
  gate: {},
  shares: [{ symptom: 'stalls', gate: {}, of100 }],
  circuits: [],
  repair: null,
  onset: null,
  wayOut: 'tow',
  limpRefused: null,
  provedBy: 'It runs again.',
  source,
})

const check: CheckItem = {
  kind: 'check',
  id: 'lookAtPlug',
  name: 'Look at the plug',
  purpose: 'Tells a wet plug from a dry one.',
  gate: {},
  people: 1,
  onePersonWay: null,
  roles: ['mechanic', 'guide'],
  guideSafe: true,
  light: 'lampEnough',
  weather: null,
  setups: ['seatOff'],
  tools: [{ tool: 'plugSpanner', accuracy: null }],
  machineState: 'off',
  mayMoveMachine: false,
  minutes: 3,
  costMinor: 0,
  steps: [{ text: 'Turn the plug out and look at it.', caution: null }],
  cautions: [],
  record: 'Wet or dry.',
  outcomes: [
    { id: 'dry', name: 'Dry', good: true },
    { id: 'wet', name: 'Wet', good: false },
  ],
  table: { plugWorn: [60, 40], plugWet: [10, 90] },
  otherwise: [95, 5],
  expected: [],
  reading: null,
  passDoesNotProve: 'A dry plug may still not spark.',
  stopWhen: null,
  basis: 'guess',
  basisWords: 'Nobody counted it.',
  source,
}

const features = FEATURE_NAMES.map(
  (id): FeatureItem => ({
    kind: 'feature',
    id,
    name: `Feature ${id}`,
    question: 'Which is it?',
    answers: Object.fromEntries(FEATURES[id].map((value) => [value, `It is ${value}`])),
    source,
  }),
)

const failures = Array.from(
  { length: 32 },
  (_, fmi): FailureItem => ({
    kind: 'failure',
    id: `fmi${fmi}`,
    fmi,
    name: `Failure kind ${fmi}`,
    failure: `kind${fmi}`,
    firstThought: null,
    byRole: null,
    otherwise: 1,
    supports: null,
    arguesAgainst: null,
    doesNotProve: 'Which part it is.',
    source,
  }),
)

/** A complaint, two faults, a check that tells them apart, and the words they use. */
export const smallRightBook = (): CodeBookItem[] => [
  { kind: 'system', id: 'spark', name: 'Spark', source },
  { kind: 'tool', id: 'plugSpanner', name: 'Plug spanner', source },
  {
    kind: 'setup',
    id: 'seatOff',
    name: 'Seat off',
    minutes: 2,
    requires: [],
    closedByTest: false,
    source,
  },
  {
    kind: 'symptom',
    id: 'stalls',
    name: 'Stalls at idle',
    gate: {},
    riderWords: ['it dies when I let go'],
    conditions: [],
    opens: 'suspects',
    engine: 'runs',
    cautions: [],
    firstLook: ['lookAtPlug'],
    twoWrongOf100: 5,
    source,
  },
  fault('plugWorn', 'Plug worn', 50),
  fault('plugWet', 'Plug wet with fuel', 40),
  check,
  ...features,
  ...failures,
]
