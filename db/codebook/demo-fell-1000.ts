import type { MachineModel } from '@/lib/model/machine-model'
import { demoParts } from './demo-build'
import { FELL_1000_ENGINE } from './demo-fell-1000-engine'
import { FELL_1000_MACHINE } from './demo-fell-1000-machine'
import { page } from './demo-figures'

/** The parts the demo shop buys for this model; numbers, prices and failure shares are invented. */
const PARTS = demoParts([
  ['ignitionCoil', ['TF-1000-212', 16800, 2], ['AX-7790', 5900, 10]],
  ['sparkPlug', ['TF-1000-211', 1600, 1], ['AX-0322', 900, 2]],
  ['relay', ['TM-0900-075', 2200, 1], ['AX-5104', 800, 3]],
  ['fuseSet', ['TM-0900-060', 900, 1], ['AX-5060', 400, 1]],
  ['fuelPumpUnit', ['TF-1000-221', 42800, 3], ['AX-2260', 18900, 12]],
  ['fuelFilter', ['TF-1000-223', 4800, 1], ['AX-2243', 2100, 3]],
  ['injector', ['TF-1000-224', 15900, 2]],
  ['crankSensorUnit', ['TF-1000-240', 9800, 2], ['AX-7766', 3900, 9]],
  ['throttleBodyUnit', ['TF-1000-231', 68900, 2]],
  ['gripUnit', ['TF-1000-233', 22400, 2]],
  ['battery12V', ['TF-1000-260', 16900, 3], ['AX-1290', 9900, 6]],
  ['groundStrap', ['TF-1000-261', 2400, 1], ['AX-1206', 1100, 1]],
  ['airFilter', ['TF-1000-214', 4600, 1], ['AX-1814', 2400, 3]],
  ['engineModule', ['TF-1000-271', 98000, 1]],
  ['stopSwitch', ['TF-1000-263', 4900, 1]],
  ['tipOverUnit', ['TF-1000-264', 7900, 2]],
  ['driveBelt', ['TF-1000-300', 18900, 3], ['AX-3000', 9400, 11]],
  ['assistUnit', ['TF-1000-280', 118000, 2]],
  ['fourWheelUnit', ['TF-1000-290', 28900, 3]],
  ['padSet', ['TF-1000-310', 6900, 1], ['AX-3110', 3200, 4]],
  ['tieRod', ['TF-1000-281', 8900, 1], ['AX-2810', 4200, 5]],
  ['wheelBearingSet', ['TF-1000-311', 7400, 1], ['AX-3111', 3600, 6]],
])

/** Units 41 and 42 of the demo fleet: a side-by-side, two cylinders, electronic throttle. Maker, model and every figure are invented. */
export const FELL_1000: MachineModel = {
  id: '01980000-0000-7000-8000-000000000204',
  maker: 'Tarnholt',
  model: 'Fell 1000',
  features: {
    kind: 'sideBySide',
    strokes: 'four',
    fuelling: 'injection',
    battery: 'yes',
    primesAtKeyOn: 'yes',
    coilType: 'inductive',
    cooling: 'liquid',
    drive: 'belt',
    neutral: 'yes',
    electricStart: 'yes',
    handStart: 'none',
    electronicThrottle: 'yes',
    steeringAssist: 'yes',
    cylinders: 'two',
  },
  specSheet: {
    showCodes: {
      steps: [
        'Lever in park. Key on, engine off.',
        'Press the left dash key until the clock blinks, then both keys for five seconds.',
        'The dash counts the codes. Press the right key for the next one.',
        'Each page shows module, number, kind and count, from top to bottom.',
        'Write all four down, or photograph each page, before the key goes off.',
      ],
      clearSteps: [
        'Record every code first. A cleared code is gone for all modules.',
        'Go to the last page and hold both keys for ten seconds.',
        'Key off for thirty seconds, so that the throttle learns its stop again.',
        'Start it and show the codes once more.',
      ],
      source: page(320),
    },
    components: [...FELL_1000_ENGINE, ...FELL_1000_MACHINE],
    cutOut: 'opensToStop',
    engagementRpm: 1600,
    massKg: 712,
    towPreparation:
      'Lever in neutral. With the key off the steering has no assist: it goes heavy, one person stays at the wheel. On a long tow take the belt off. Walking pace, never downhill without brakes.',
    parts: PARTS,
    demo: true,
  },
  source: 'demo, invented',
}
