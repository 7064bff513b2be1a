import type { CheckItem } from '@/lib/model/code-book'
import { MONOXIDE, MOVES, VAPOUR } from './cautions'
import { OIL_STOP, SPRAYS_OUT } from './cautions-mishap'
import { check } from './draft'
import { PRACTICE } from './sources'

/** Oil feed of two-strokes, and what the smoke says. */
export const OIL_FEED_CHECKS: CheckItem[] = [
  check({
    id: 'oilFeedPulse',
    name: 'Two-stroke oil pump: pulses at the engine',
    purpose: 'Proves that the pump pushes oil, without burning any fuel.',
    gate: { strokes: ['two'] },
    setups: ['sidePanelOff', 'plugOut'],
    tools: ['pliers', 'cleanRag', 'lamp'],
    machineState: 'cranking',
    minutes: 10,
    steps: [
      ['Plugs out, caps grounded far off. Throttle wide if a cable moves the pump.', SPRAYS_OUT],
      'Pull one thin oil line off at the engine. Hold white paper under it.',
      ['Turn it over with starter, rope or kick, twenty turns, slowly.', MOVES],
      'Drops must come in pulses. Try each line.',
      'Line on, clip on. Wipe up.',
    ],
    cautions: [
      OIL_STOP,
      {
        signal: 'WARNING',
        text: 'Ignition high voltage: caps grounded, hands off. Fuel mist from the holes burns.',
      },
    ],
    record: 'Drops in twenty turns, each line.',
    outcomes: [
      ['pulses', 'Drops in pulses from each line'],
      ['weak', 'Few drops, or one line weak'],
      ['none', 'None'],
    ],
    table: {
      twoStrokeOilFeed: [8, 20, 72],
      oilLow: [10, 16, 74],
      oilLineLeak: [32, 36, 32],
    },
    otherwise: [91, 7.5, 1.5],
    expected: [
      { words: 'A few drops from each line in twenty turns, pump arm open.', source: PRACTICE },
    ],
    passDoesNotProve:
      'It can feed while cranking and starve at speed if the filter is half blocked.',
    stopWhen: 'None: no start without oil in the fuel.',
    basis: 'physics',
    basisWords: 'A pump that turns moves oil. How many drops count is practice.',
  }),
  check({
    id: 'mixRing',
    name: 'Drop of fuel on paper: oil ring',
    purpose: 'Shows whether there is oil in the fuel mix.',
    gate: { strokes: ['two'] },
    tools: ['jar', 'cleanRag'],
    weather: 'Under cover in rain or snow.',
    minutes: 7,
    steps: [
      [
        'Only on a machine that takes mixed petrol; with an oil tank of its own leave this. Engine cool. Draw a little fuel into the jar.',
        VAPOUR,
      ],
      'One drop on white paper. Next to it a drop of known mix, if you have one.',
      'Keep the paper in open air for five minutes.',
      'Mix leaves an oily ring that stays. Plain petrol leaves nothing.',
    ],
    record: 'Ring or none, colour; photo of the paper.',
    outcomes: [
      ['ring', 'Clear oily ring'],
      ['faint', 'Faint ring'],
      ['none', 'No ring'],
    ],
    table: { noOilInMix: [5, 27, 68], fuelStale: [62, 30, 8] },
    otherwise: [85, 13, 2],
    expected: [
      {
        words: 'An oily ring on a machine that runs on mix. With an oil tank: none is right.',
        source: PRACTICE,
      },
    ],
    passDoesNotProve: 'A ring does not show how much oil is in it.',
    stopWhen: 'No ring on a premix machine: no start.',
    basis: 'physics',
    basisWords: 'Petrol dries off, oil stays. How well an eye judges it is a guess.',
  }),
  check({
    id: 'smokeLook',
    name: 'Exhaust smoke: colour and how long',
    purpose: 'Parts oil, water and rich mixture by the smoke.',
    gate: {},
    light: 'daylight',
    machineState: 'runningNeutral',
    minutes: 4,
    steps: [
      'Only if level, drips and plugs are right. No start after water before the plugs were out.',
      ['Start it in the open. Idle, then a little throttle below drive take-up.', MOVES],
      'Watch the exhaust for two minutes from the side.',
      'Blue and sharp is oil. White that hangs is water or coolant. Black is rich.',
    ],
    cautions: [MONOXIDE, OIL_STOP],
    record: 'Colour, thick or thin, fades or stays; short film.',
    outcomes: [
      ['clear', 'Clear, or thin and gone in a minute'],
      ['black', 'Black'],
      ['white', 'White that hangs'],
      ['blue', 'Blue that stays'],
    ],
    table: {
      oilInAirbox: [12, 4, 6, 78],
      lowCompression: [46, 6, 4, 44],
      pistonScuffed: [52, 5, 4, 39],
      headGasketLeaking: [30, 3, 63, 4],
      waterInCrankcase: [24, 3, 69, 4],
      waterInIntake: [38, 3, 56, 3],
      crankSealLeak: [62, 5, 5, 28],
      crankcaseOilSeal: [74, 5, 4, 17],
      mapSensorBad: [34, 62, 2, 2],
      coolantSensorBad: [44, 52, 2, 2],
      chokeWrong: [30, 66, 2, 2],
      airFilterBlocked: [50, 46, 2, 2],
      injectorLeaking: [38, 58, 2, 2],
      floatNeedleStuck: [42, 54, 2, 2],
      cylinderFlooded: [50, 45, 3, 2],
      fuelRegulatorLeak: [66, 30, 2, 2],
    },
    otherwise: [88, 8, 2, 2],
    expected: [
      {
        words: 'Clear when warm; steam in frost; a two-stroke a thin blue haze.',
        source: PRACTICE,
      },
    ],
    passDoesNotProve: 'Oil left in the pipe smokes for minutes after the cause is mended.',
    stopWhen: 'Thick smoke, knock or lamp: stop it.',
    basis: 'commonPractice',
    basisWords: 'Guess: three of four such faults show their colour within two minutes.',
  }),
]
