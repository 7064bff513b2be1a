import type { MachineModel } from '@/lib/model/machine-model'
import { demoParts } from './demo-build'
import { CRAG_450_COMPONENTS } from './demo-crag-450-components'
import { page } from './demo-figures'

/** The parts the demo shop buys for this model; numbers, prices and failure shares are invented. */
const PARTS = demoParts([
  ['ignitionCoil', ['TC-0450-086', 14200, 2], ['AX-7745', 5100, 10]],
  ['sparkPlug', ['TC-0450-085', 1900, 1], ['AX-0317', 1100, 2]],
  ['injector', ['TC-0450-092', 17900, 2]],
  ['fuelPumpUnit', ['TC-0450-090', 29900, 4], ['AX-2245', 12900, 12]],
  ['fuelFilter', ['TC-0450-091', 2400, 1], ['AX-2246', 1200, 2]],
  ['crankSensorUnit', ['TC-0450-094', 9200, 2]],
  ['throttleSensorUnit', ['TC-0450-096', 8900, 2]],
  ['tipOverUnit', ['TC-0450-098', 6900, 2]],
  ['relay', ['TM-0900-075', 2200, 1], ['AX-5104', 800, 3]],
  ['battery12V', ['TC-0450-100', 15900, 3], ['AX-1245', 9900, 8]],
  ['groundStrap', ['TC-0450-101', 1900, 1]],
  ['airFilter', ['TC-0450-064', 2900, 1], ['AX-6445', 1500, 2]],
  ['stopSwitch', ['TC-0450-103', 2900, 1]],
  ['driveChain', ['TC-0450-110', 9900, 1], ['AX-1104', 5900, 3]],
  ['sprocketSet', ['TC-0450-111', 8900, 1], ['AX-1114', 4600, 3]],
  ['clutchPlates', ['TC-0450-076', 9800, 1], ['AX-7645', 5200, 4]],
  ['padSet', ['TC-0450-114', 3900, 1], ['AX-1144', 1900, 3]],
])

/** Unit 33 of the demo fleet: a four-stroke dirt bike with injection and electric start. Maker, model and every figure are invented. */
export const CRAG_450: MachineModel = {
  id: '01980000-0000-7000-8000-000000000209',
  maker: 'Tarnholt',
  model: 'Crag 450',
  features: {
    kind: 'dirtBike',
    strokes: 'four',
    fuelling: 'injection',
    battery: 'yes',
    primesAtKeyOn: 'yes',
    coilType: 'inductive',
    cooling: 'liquid',
    drive: 'chain',
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
        'Run switch off. Neutral.',
        'Hold the mode button and switch run on. Keep it held for five seconds.',
        'The hour meter shows the first code: a letter and four digits.',
        'Press the button once for the next one. "----" means no more codes.',
        'Write them down in the order shown before you switch off.',
      ],
      clearSteps: [
        'Record every code first. Cleared codes are gone.',
        'At "----" hold the button for ten seconds.',
        'Switch off for ten seconds. Start it and show the codes again.',
      ],
      source: page(120),
    },
    components: CRAG_450_COMPONENTS,
    cutOut: 'closesToStop',
    engagementRpm: null,
    massKg: 109,
    towPreparation:
      'Neutral, run switch off. Strap once round the left foot peg, held by the foot so that it can be let go; walking pace, brakes tried first.',
    parts: PARTS,
    demo: true,
  },
  source: 'demo, invented',
}
