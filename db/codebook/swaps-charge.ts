import type { SwapItem } from '@/lib/model/code-book'
import { BATTERY_GAS, KEY_OFF, MONOXIDE, MOVES } from './cautions'
import { FAN_STARTS, HOT_REGULATOR, POISON, SCALDS, SPEED_CAP } from './cautions-charge'
import { COOLANT, RADIATOR_FAN, WITH_BATTERY } from './gates-charge'
import { GUESS } from './sources'

/** Swaps with a known-good part, in the order fit, refit, fit. */
export const CHARGE_SWAPS: SwapItem[] = [
  {
    kind: 'swap',
    id: 'regulatorSwap',
    name: 'Regulator swap',
    fault: 'regulatorFailed',
    part: 'regulatorUnit',
    gate: WITH_BATTERY,
    minutes: 18,
    setups: ['sidePanelOff'],
    guideSafe: false,
    cautions: [HOT_REGULATOR, KEY_OFF, BATTERY_GAS, SPEED_CAP, MOVES, MONOXIDE],
    steps: [
      { text: 'Key off. The good one must be of the same kind and plug.', caution: KEY_OFF },
      { text: 'Fit it with bare metal below it. Plug it in.', caution: HOT_REGULATOR },
      { text: 'Brake on, start it, read the charge volts as before.', caution: SPEED_CAP },
      { text: 'Key off. Put the old one back. Read again: are they wrong again?', caution: null },
      { text: 'Fit the good one for good, if they were.', caution: null },
    ],
    table: {
      regulatorFailed: [6, 12, 82],
      regulatorOvercharges: [9, 13, 78],
      chargingPlugBurnt: [44, 49, 7],
      groundPoor: [66, 30, 4],
    },
    otherwise: [95, 4, 1],
    basis: 'physics',
    basisWords: 'Only the part that was changed went away and came back.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'fanRelaySwap',
    name: 'Fan relay swap',
    fault: 'fanCircuitFault',
    part: 'relay',
    gate: RADIATOR_FAN,
    minutes: 5,
    setups: ['seatOff'],
    guideSafe: false,
    cautions: [FAN_STARTS, KEY_OFF],
    steps: [
      { text: 'Key off. Find a relay with the same numbers on it.', caution: KEY_OFF },
      { text: 'Put it in the place of the fan relay. Hot engine, key on.', caution: FAN_STARTS },
      { text: 'Does the fan run now? Put the old one back: is it still again?', caution: null },
      { text: 'Leave the good one in if it was. Give the other circuit its own.', caution: null },
    ],
    table: { fanCircuitFault: [66, 8, 26], groundPoor: [91, 8, 1] },
    otherwise: [96, 3.6, 0.4],
    basis: 'commonPractice',
    basisWords: 'Guess: a quarter of fans that stay still have a bad relay.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'pressureCapSwap',
    name: 'Pressure cap swap',
    fault: 'coolantCapLeaks',
    part: 'coolantCap',
    gate: COOLANT,
    minutes: 16,
    setups: ['engineCold'],
    guideSafe: false,
    cautions: [SCALDS, POISON, MOVES, MONOXIDE],
    steps: [
      { text: 'Engine cold through. Fill to the neck. Fit the good cap.', caution: SCALDS },
      { text: 'It must have the same figure on it, no higher.', caution: null },
      { text: 'Brake on, start it, warm it up. Does it still spit?', caution: MOVES },
      { text: 'Stop it. Let it cool, fit the old cap, warm it up again.', caution: SCALDS },
    ],
    table: {
      coolantCapLeaks: [8, 17, 75],
      airInCoolant: [72, 26, 2],
      headGasketLeaking: [90, 9, 1],
      coolantLow: [86, 13, 1],
    },
    otherwise: [92, 7, 1],
    basis: 'physics',
    basisWords: 'Only the cap was changed; air that worked its way out can look the same once.',
    source: GUESS,
  },
]
