import type { MachineModel } from '@/lib/model/machine-model'
import { page } from './demo-figures'
import { MOOR_450_AIR } from './demo-moor-450-air'
import { MOOR_450_DRIVE } from './demo-moor-450-drive'
import { MOOR_450_ELECTRICS } from './demo-moor-450-electrics'
import { MOOR_450_FUEL } from './demo-moor-450-fuel'
import { MOOR_450_PARTS } from './demo-moor-450-parts'

/** Units 11 and 14 of the demo fleet: one cylinder, injection, belt drive. Maker, model and every figure are invented. */
export const MOOR_450: MachineModel = {
  id: '01980000-0000-7000-8000-000000000201',
  maker: 'Tarnholt',
  model: 'Moor 450',
  features: {
    kind: 'atv',
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
    electronicThrottle: 'no',
    steeringAssist: 'no',
    cylinders: 'one',
  },
  specSheet: {
    showCodes: {
      steps: [
        'Key off. Lever in neutral, brake on.',
        'Press and hold the round button under the dash glass.',
        'Key on while you hold it. Let go when the small spanner blinks.',
        'Three figures show one after the other, four seconds each: module, number, kind.',
        'Press the button once for the next code. A line of dashes means no more codes.',
        'Write all of them down, or photograph each, before you turn the key off.',
      ],
      clearSteps: [
        'Record every code first. Cleared codes do not come back on their own.',
        'Show the codes as before. Wait for the line of dashes.',
        'Hold the round button for eight seconds, until the spanner stops blinking.',
        'Key off for ten seconds. Start it and show the codes again.',
      ],
      source: page(88),
    },
    components: [...MOOR_450_FUEL, ...MOOR_450_AIR, ...MOOR_450_ELECTRICS, ...MOOR_450_DRIVE],
    cutOut: 'opensToStop',
    engagementRpm: 1900,
    massKg: 296,
    towPreparation:
      'Lever in neutral. On a long tow take the belt off. Tow by the front hitch, at walking pace, nobody on it downhill without brakes.',
    parts: MOOR_450_PARTS,
    demo: true,
  },
  source: 'demo, invented',
}
