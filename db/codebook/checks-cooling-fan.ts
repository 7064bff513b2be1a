import type { CheckItem } from '@/lib/model/code-book'
import { BATTERY_GAS, HOT_ENGINE } from './cautions'
import { FAN_STARTS, SCALDS } from './cautions-charge'
import { check } from './draft'
import { COOLANT, RADIATOR_FAN } from './gates-charge'
import { PRACTICE } from './sources'

/** Electric fan and the figure on the gauge. */
export const COOLING_FAN_CHECKS: CheckItem[] = [
  check({
    id: 'fanFed',
    name: 'Fan fed straight from the battery',
    purpose: 'Parts a dead fan motor from a fan that gets no power.',
    gate: RADIATOR_FAN,
    setups: ['frontCoverOff'],
    tools: ['fusedLeads'],
    minutes: 5,
    steps: [
      ['Key off. Part the fan plug. Spin the blades with a stick: free?', FAN_STARTS],
      'Fused lead from the plus post to the plus pin of the fan. Mind the sheet.',
      ['Other lead from its other pin to the frame. It starts at once.', FAN_STARTS],
      'Ten seconds. Strong, slow, or still? Which way does it blow?',
    ],
    cautions: [
      FAN_STARTS,
      BATTERY_GAS,
      {
        signal: 'WARNING',
        text: 'A lead without a fuse melts if it slips. 15 A fuse next to the battery, connect the frame last.',
      },
    ],
    record: 'Free by hand, strong, slow or still, fuse whole.',
    outcomes: [
      ['strong', 'Runs strong'],
      ['slow', 'Slow, rough or stiff'],
      ['still', 'Stays still or blows the fuse'],
    ],
    table: { fanCircuitFault: [50, 16, 34], radiatorPacked: [88, 10, 2] },
    otherwise: [95, 4, 1],
    expected: [
      { words: 'Strong at once, blows through the radiator to the engine.', source: PRACTICE },
    ],
    passDoesNotProve: 'A fan that runs here gets no power yet from its own relay and switch.',
    stopWhen: 'Lead gets warm: take it off.',
    basis: 'physics',
    basisWords: 'A sound motor runs on battery volts. Guess: half of these faults are the motor.',
  }),
  check({
    id: 'fanPlugBulb',
    name: 'Bulb in the fan plug on a hot engine',
    purpose: 'Shows whether relay, fuse and switch send power to the fan.',
    gate: RADIATOR_FAN,
    setups: ['frontCoverOff'],
    tools: ['loadBulb'],
    machineState: 'keyOn',
    minutes: 6,
    steps: [
      ['Right after it ran hot, engine off, key off. Part the fan plug.', FAN_STARTS],
      'Put the bulb across the loom side of the plug.',
      ['Key on, two minutes. Bright, dim or dark? Lead clear of hot parts.', HOT_ENGINE],
      'Dark: look at its fuse, swap its relay with one alike, try again.',
    ],
    cautions: [FAN_STARTS, HOT_ENGINE, SCALDS],
    record: 'Bright, dim or dark; gauge; fuse and relay.',
    outcomes: [
      ['bright', 'Bright when hot'],
      ['dim', 'Dim'],
      ['dark', 'Stays dark though hot'],
    ],
    table: {
      fanCircuitFault: [37, 8, 55],
      coolantSensorBad: [48, 4, 48],
      coolantLow: [62, 4, 34],
      airInCoolant: [66, 4, 30],
      thermostatStuck: [68, 4, 28],
      batteryLow: [62, 26, 12],
      groundPoor: [60, 28, 12],
    },
    otherwise: [86, 4, 10],
    expected: [{ words: 'Bright as on the battery, once the engine is hot.', source: PRACTICE }],
    passDoesNotProve: 'A bulb shines through a contact that the fan overloads.',
    basis: 'physics',
    basisWords: 'A bulb loads the circuit as a fan does, only less. Shares are guesses.',
  }),
  check({
    id: 'gaugeAgainstMetal',
    name: 'Gauge against a thermometer on the metal',
    purpose: 'Tells a hot engine from a gauge or sensor that only says so.',
    gate: COOLANT,
    setups: ['sidePanelOff'],
    tools: [['thermometer', '2 C']],
    machineState: 'keyOn',
    minutes: 4,
    steps: [
      ['Right after it ran, engine off. Key on. Read the gauge or the lamp.', FAN_STARTS],
      ['Thermometer on bare metal of the head, beside the sensor. One minute.', HOT_ENGINE],
      'Compare the two. Read again after five minutes, and cold.',
    ],
    cautions: [FAN_STARTS, HOT_ENGINE, SCALDS],
    record: 'Gauge, metal, minutes since it ran.',
    outcomes: [
      ['agrees', 'Agrees within ten degrees'],
      ['off', 'Ten to twenty degrees off'],
      ['wrong', 'Says hot, and it is not'],
    ],
    table: {
      coolantSensorBad: [9, 17, 74],
      groundPoor: [66, 24, 10],
      sensorSupplyDown: [72, 17, 11],
      airInCoolant: [58, 36, 6],
    },
    otherwise: [88, 10, 2],
    expected: [{ words: 'Within ten degrees once both are steady.', source: PRACTICE }],
    passDoesNotProve: 'Metal can be hot where no coolant is, and the gauge low.',
    basis: 'physics',
    basisWords: 'A sound sensor follows the metal around it. Shares are guesses.',
  }),
]
