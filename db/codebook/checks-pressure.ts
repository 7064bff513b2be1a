import type { CheckItem } from '@/lib/model/code-book'
import { FUEL_PRESSURE, MOVES, VAPOUR } from './cautions'
import { GUESS, PRACTICE } from './sources'

/** Injection fuel pressure: there, right, and holding. */
export const PRESSURE_CHECKS: CheckItem[] = [
  {
    kind: 'check',
    id: 'fuelPressureGauge',
    name: 'Fuel pressure with a gauge',
    purpose: 'Shows whether pump, filter and regulator make the pressure the injector needs.',
    gate: { fuelling: ['injection'] },
    people: 1,
    onePersonWay: null,
    roles: ['mechanic'],
    guideSafe: false,
    light: 'lampEnough',
    weather: null,
    setups: ['tankCoverOff', 'railRelieved', 'gaugeInLine'],
    tools: [
      { tool: 'fuelGauge', accuracy: '2 % of full scale' },
      { tool: 'fuelCan', accuracy: null },
    ],
    machineState: 'cranking',
    mayMoveMachine: true,
    minutes: 14,
    costMinor: 0,
    steps: [
      {
        text: 'Let the pressure off: pump fuse out, crank two seconds, key off. Does not crank? Use the valve of the rail, if it has one, or leave this.',
        caution: FUEL_PRESSURE,
      },
      {
        text: 'Rag round the joint, glasses on. Open it slowly. Fit the gauge in line.',
        caution: VAPOUR,
      },
      { text: 'Fuse in. Key on three times. Look for drips before you go on.', caution: null },
      { text: 'Crank or let it start and die. Read the gauge all the while.', caution: MOVES },
      { text: 'Record the pressure as the engine dies.', caution: null },
    ],
    cautions: [FUEL_PRESSURE, VAPOUR, MOVES],
    record: 'kPa at key on, while cranking, as it dies.',
    outcomes: [
      { id: 'in', name: 'Within limits', good: true },
      { id: 'tooClose', name: 'Too close to call', good: false },
      { id: 'outHigh', name: 'Above limits', good: false },
      { id: 'outLow', name: 'Below limits or falls as it dies', good: false },
    ],
    table: {
      fuelPumpWeak: [16, 12, 2, 70],
      fuelPumpDead: [3, 2, 0, 95],
      fuelPumpRelay: [20, 4, 0, 76],
      fuelPumpWiring: [20, 8, 0, 72],
      fuelFilterBlocked: [44, 12, 2, 42],
      fuelRegulatorLeak: [34, 12, 2, 52],
      fuelOutOrShut: [10, 4, 0, 86],
      tankVentBlocked: [52, 12, 0, 36],
      fuelLineIce: [18, 8, 0, 74],
      fuelHoseLeak: [34, 14, 0, 52],
      mainRelayFault: [40, 6, 0, 54],
      batteryLow: [58, 16, 0, 26],
      keySwitchHarness: [58, 8, 0, 34],
      stopCircuitFault: [64, 4, 0, 32],
      tipOverTripped: [64, 4, 0, 32],
    },
    otherwise: [90, 5, 2, 3],
    expected: [{ words: "The maker's figure; 250 to 400 kPa is usual.", source: PRACTICE }],
    reading: {
      quantity: 'pressure',
      component: 'fuelRail',
      value: 'pressure',
      fallback: { low: 250, high: 400, unit: 'kPa', source: PRACTICE },
      good: [
        { weight: 0.9, from: 0.93, to: 1.07 },
        { weight: 0.1, from: 0.8, to: 1.2 },
      ],
      byFault: {
        fuelPumpWeak: [
          { weight: 0.25, from: 0.93, to: 1.07 },
          { weight: 0.75, from: 0.3, to: 0.9 },
        ],
        fuelPumpDead: [
          { weight: 0.04, from: 0.93, to: 1.07 },
          { weight: 0.96, from: 0, to: 0.2 },
        ],
        fuelPumpRelay: [
          { weight: 0.24, from: 0.93, to: 1.07 },
          { weight: 0.76, from: 0, to: 0.4 },
        ],
        fuelPumpWiring: [
          { weight: 0.26, from: 0.93, to: 1.07 },
          { weight: 0.74, from: 0, to: 0.85 },
        ],
        fuelFilterBlocked: [
          { weight: 0.55, from: 0.93, to: 1.07 },
          { weight: 0.45, from: 0.4, to: 0.9 },
        ],
        fuelRegulatorLeak: [
          { weight: 0.44, from: 0.93, to: 1.07 },
          { weight: 0.56, from: 0.3, to: 0.9 },
        ],
        fuelOutOrShut: [
          { weight: 0.13, from: 0.93, to: 1.07 },
          { weight: 0.87, from: 0, to: 0.5 },
        ],
        tankVentBlocked: [
          { weight: 0.62, from: 0.93, to: 1.07 },
          { weight: 0.38, from: 0.4, to: 0.9 },
        ],
        fuelLineIce: [
          { weight: 0.24, from: 0.93, to: 1.07 },
          { weight: 0.76, from: 0, to: 0.8 },
        ],
        fuelHoseLeak: [
          { weight: 0.46, from: 0.93, to: 1.07 },
          { weight: 0.54, from: 0.4, to: 0.9 },
        ],
        mainRelayFault: [
          { weight: 0.45, from: 0.93, to: 1.07 },
          { weight: 0.55, from: 0, to: 0.5 },
        ],
        batteryLow: [
          { weight: 0.72, from: 0.93, to: 1.07 },
          { weight: 0.28, from: 0.6, to: 0.9 },
        ],
        keySwitchHarness: [
          { weight: 0.65, from: 0.93, to: 1.07 },
          { weight: 0.35, from: 0, to: 0.6 },
        ],
        stopCircuitFault: [
          { weight: 0.67, from: 0.93, to: 1.07 },
          { weight: 0.33, from: 0, to: 0.3 },
        ],
        tipOverTripped: [
          { weight: 0.67, from: 0.93, to: 1.07 },
          { weight: 0.33, from: 0, to: 0.3 },
        ],
      },
    },
    passDoesNotProve:
      'Right pressure with no flow behind it can still starve the engine: do the flow check too.',
    stopWhen: 'Any drip at the gauge joint: key off, wipe, do it again.',
    basis: 'physics',
    basisWords: 'Pressure is what the injector needs. How often each fault shows it is a guess.',
    source: GUESS,
  },
  {
    kind: 'check',
    id: 'fuelPressureHold',
    name: 'Does the pressure hold',
    purpose: 'Shows a regulator or check valve that lets the pressure back.',
    gate: { fuelling: ['injection'] },
    people: 1,
    onePersonWay: null,
    roles: ['mechanic'],
    guideSafe: false,
    light: 'lampEnough',
    weather: null,
    setups: ['tankCoverOff', 'railRelieved', 'gaugeInLine'],
    tools: [
      { tool: 'fuelGauge', accuracy: '2 % of full scale' },
      { tool: 'fuelCan', accuracy: null },
    ],
    machineState: 'keyOn',
    mayMoveMachine: false,
    minutes: 12,
    costMinor: 0,
    steps: [
      {
        text: 'With the gauge still in line: key on three times, then key off.',
        caution: FUEL_PRESSURE,
      },
      { text: 'Write down the pressure and the time.', caution: null },
      { text: 'Wait ten minutes. Touch nothing.', caution: null },
      { text: 'Write down the pressure again.', caution: null },
      { text: 'Let the pressure off into a rag before the gauge comes out.', caution: VAPOUR },
    ],
    cautions: [FUEL_PRESSURE, VAPOUR],
    record: 'kPa at the start and after ten minutes.',
    outcomes: [
      { id: 'holds', name: 'Loses less than a fifth', good: true },
      { id: 'some', name: 'Loses a fifth to a half', good: false },
      { id: 'falls', name: 'Loses more than half', good: false },
    ],
    table: {
      fuelRegulatorLeak: [8, 22, 70],
      fuelHoseLeak: [40, 26, 34],
      fuelPumpWeak: [66, 20, 14],
    },
    otherwise: [86, 10, 4],
    expected: [{ words: 'Less than a fifth lost in ten minutes.', source: PRACTICE }],
    reading: null,
    passDoesNotProve: 'It holds cold and may not hold hot.',
    stopWhen: 'Fuel anywhere outside.',
    basis: 'commonPractice',
    basisWords: 'The limit of a fifth is common practice; shares are guesses.',
    source: GUESS,
  },
]
