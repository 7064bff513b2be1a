import type { CheckItem } from '@/lib/model/code-book'
import { BATTERY_GAS, KEY_OFF } from './cautions'
import { BOILING_BATTERY, HOT_REGULATOR } from './cautions-charge'
import { check } from './draft'
import { WITH_BATTERY } from './gates-charge'
import { PRACTICE } from './sources'

/** Charging by eye, nose and hand, engine still. */
export const CHARGE_LOOKS: CheckItem[] = [
  check({
    id: 'batteryCaseLook',
    name: 'Battery case: sides, wet, heat, smell',
    purpose: 'Finds a battery that was boiled by too many volts, or has died.',
    gate: WITH_BATTERY,
    guideSafe: true,
    setups: ['seatOff'],
    minutes: 2,
    steps: [
      ['Key off. Look from a step away: swollen, split, smoking, hissing?', BOILING_BATTERY],
      ['No? Smell near it. Rotten eggs mean that it was boiled.', BATTERY_GAS],
      'Back of the hand near each side. Is one warm?',
      'Look for wet, white or eaten spots on the tray and below.',
    ],
    cautions: [BOILING_BATTERY, BATTERY_GAS],
    record: 'Sides flat or swollen, wet, warm, smell, age on the label; photo.',
    outcomes: [
      ['sound', 'Flat, dry, cool, no smell'],
      ['stained', 'Old stains or white crust, otherwise flat and dry'],
      ['boiled', 'Swollen, wet, hot or smells'],
    ],
    table: {
      regulatorOvercharges: [26, 17, 57],
      batteryFailed: [50, 21, 29],
      batteryTerminalLoose: [65, 32, 3],
      batteryLow: [74, 22, 4],
      groundPoor: [71, 27, 2],
    },
    otherwise: [84, 14.5, 1.5],
    expected: [{ words: 'Sides flat, dry, as cool as the air, no smell.', source: PRACTICE }],
    passDoesNotProve: 'A battery can look new and have a dead cell.',
    stopWhen: 'Swollen, hissing or hot: leave it and stand away.',
    basis: 'commonPractice',
    basisWords: 'Overcharge boils a battery and shows on its case. Shares are guesses.',
  }),
  check({
    id: 'chargingPlugLook',
    name: 'Charging plug: brown, melted or loose',
    purpose: 'Finds the plug between stator, regulator and battery that has burnt.',
    gate: WITH_BATTERY,
    guideSafe: true,
    setups: ['sidePanelOff'],
    tools: ['lamp'],
    minutes: 3,
    steps: [
      ['Key off. Find the finned box and follow its thick wires to the plugs.', HOT_REGULATOR],
      'Look for brown, shiny or sunken plastic, and for stiff wires.',
      ['Part each plug. Look at the pins: bright, black, green or wet?', KEY_OFF],
      'Push it home until it clicks. Tug each wire once.',
    ],
    cautions: [HOT_REGULATOR, KEY_OFF],
    record: 'Which plug, colour of plastic and pins; photo.',
    outcomes: [
      ['bright', 'Plastic as new, pins bright, tight'],
      ['doubt', 'Dirty, damp or loose'],
      ['burnt', 'Brown, melted or black pins'],
    ],
    table: {
      chargingPlugBurnt: [7, 18, 75],
      statorFault: [59, 24, 17],
      regulatorDead: [63, 23, 14],
      regulatorFailed: [58, 22, 20],
      regulatorOvercharges: [70, 20, 10],
      keySwitchHarness: [70, 24, 6],
      groundPoor: [72, 25, 3],
    },
    otherwise: [82, 17, 1],
    expected: [
      { words: 'Same colour as the other plugs, pins bright, clicks in.', source: PRACTICE },
    ],
    passDoesNotProve: 'A pin can be open inside a plug that looks new.',
    stopWhen: 'Smoke or a hot plug with the key off: battery off.',
    basis: 'physics',
    basisWords: 'A poor joint that carries the whole charge heats its plastic. Shares are guesses.',
  }),
  check({
    id: 'extraLoadLook',
    name: 'What draws, and how it was ridden',
    purpose: 'Tells a charging fault from a machine that used more than it makes.',
    gate: WITH_BATTERY,
    guideSafe: true,
    light: 'any',
    minutes: 2,
    steps: [
      'Ask how it was ridden today: walking pace, long idling, winching?',
      'Look for added lamps, heaters, pumps, music and a winch.',
      'Feel if any of them stays warm with the key off.',
      'Note which were on, and for how long.',
    ],
    record: 'Each added load, how long on, pace of the day.',
    outcomes: [
      ['asBuilt', 'As built, ridden briskly'],
      ['some', 'Some added load or slow hours'],
      ['heavy', 'Much load for long at low engine speed'],
    ],
    table: {
      loadTooGreat: [8, 28, 64],
      parasiticDrain: [34, 45, 21],
      chargeFuseOpen: [52, 28, 20],
      statorFault: [56, 28, 16],
      batteryFailed: [62, 27, 11],
      chargingPlugBurnt: [61, 27, 12],
    },
    otherwise: [70, 23, 7],
    expected: [
      {
        words: 'A small machine makes some 100 to 400 W at speed, at idle a third of it.',
        source: PRACTICE,
      },
    ],
    passDoesNotProve: 'A heater that was built in draws as much as an added one.',
    basis: 'guess',
    basisWords: 'Sums of watts are physics; what riders remember is a guess.',
  }),
]
