import type { CheckItem } from '@/lib/model/code-book'
import { MONOXIDE, MOVES } from './cautions'
import { GUESS, PRACTICE } from './sources'

/** What stops the engine on purpose: tip-over sensor, stop switch, tether. */
export const STOP_CHECKS: CheckItem[] = [
  {
    kind: 'check',
    id: 'tipOverReset',
    name: 'Tip-over sensor: level, reset, look',
    purpose: 'Clears a tripped tip-over sensor and finds a loose one.',
    gate: { fuelling: ['injection'] },
    people: 1,
    onePersonWay: null,
    roles: ['mechanic', 'guide'],
    guideSafe: true,
    light: 'lampEnough',
    weather: null,
    setups: [],
    tools: [],
    machineState: 'runningNeutral',
    mayMoveMachine: true,
    minutes: 4,
    costMinor: 0,
    steps: [
      {
        text: 'Get the machine level on its wheels or track. Two people for a heavy one.',
        caution: {
          signal: 'WARNING',
          text: 'A machine that rolls or slides pins people. Uphill side, chocks, never below it.',
        },
      },
      { text: 'Key off. Wait thirty seconds.', caution: null },
      { text: 'Look at the sensor: tight, right way up, arrow up, plug home.', caution: null },
      { text: 'Key on, start it.', caution: MOVES },
      {
        text: 'Did it help? If it was tripped by a rollover, the machine stays on hold until examined.',
        caution: null,
      },
    ],
    cautions: [MOVES, MONOXIDE],
    record: 'Level or not, tight or not, ran after it or not.',
    outcomes: [
      { id: 'noChange', name: 'Tight and level, no change', good: true },
      { id: 'loose', name: 'Found loose or askew', good: false },
      { id: 'cured', name: 'Runs after the reset', good: false },
    ],
    table: { tipOverTripped: [14, 18, 68] },
    otherwise: [93, 4, 3],
    expected: [
      { words: 'Tight, arrow up; a reset changes nothing on a sound one.', source: PRACTICE },
    ],
    reading: null,
    passDoesNotProve: 'A sensor that trips when it shakes can pass standing still.',
    stopWhen: 'Rolled and not examined: no riding it out.',
    basis: 'commonPractice',
    basisWords: 'Guess: two thirds of tripped sensors clear with level and key off.',
    source: GUESS,
  },
  {
    kind: 'check',
    id: 'stopCircuitMeter',
    name: 'Stop switch and tether by meter',
    purpose: 'Finds a stop circuit that stops by itself. Polarity is in the spec sheet.',
    gate: {},
    people: 1,
    onePersonWay: null,
    roles: ['mechanic'],
    guideSafe: false,
    light: 'lampEnough',
    weather: null,
    setups: ['frontCoverOff'],
    tools: [{ tool: 'multimeter', accuracy: '1 % + 3 digits' }],
    machineState: 'off',
    mayMoveMachine: false,
    minutes: 6,
    costMinor: 0,
    steps: [
      {
        text: 'Key off. Look in the spec sheet: does this circuit open or close to stop?',
        caution: null,
      },
      { text: 'Unplug the switch. Meter on ohms across its two wires.', caution: null },
      {
        text: 'Switch run, switch stop, tether in, tether out. Write down all four.',
        caution: null,
      },
      {
        text: 'Turn the bars full left and right in run. Shake the switch. The reading must not jump.',
        caution: null,
      },
      { text: 'Plug it in. Try the stop switch before the proof run.', caution: null },
    ],
    cautions: [
      {
        signal: 'WARNING',
        text: 'Never leave the stop circuit by-passed. A machine without a working stop is on hold.',
      },
    ],
    record: 'All four positions, and any jump with the bars.',
    outcomes: [
      { id: 'clean', name: 'Changes cleanly, steady in run', good: true },
      { id: 'slow', name: 'Right, but jumps or reads some ohms', good: false },
      { id: 'wrong', name: 'Wrong or dead in a position', good: false },
    ],
    table: { stopCircuitFault: [10, 26, 64], keySwitchHarness: [70, 20, 10] },
    otherwise: [92, 6, 2],
    expected: [
      {
        words:
          'Below half an ohm over the leads when closed, open when open, no jump with the bars.',
        source: PRACTICE,
      },
    ],
    reading: null,
    passDoesNotProve:
      'The wire from the switch to the module is tested only as far as you move it.',
    stopWhen: null,
    basis: 'physics',
    basisWords: 'The switch is the only thing in the reading. Shares are guesses.',
    source: GUESS,
  },
]
