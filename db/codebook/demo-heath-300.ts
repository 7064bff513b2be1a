import type { MachineModel } from '@/lib/model/machine-model'
import { demoParts } from './demo-build'
import { page } from './demo-figures'
import { HEATH_300_COMPONENTS } from './demo-heath-300-components'

/** The parts the demo shop buys for this model; numbers, prices and failure shares are invented. */
const PARTS = demoParts([
  ['ignitionCoil', ['TH-0300-052', 7400, 2], ['AX-7730', 2600, 8]],
  ['sparkPlug', ['TH-0300-020', 700, 1], ['AX-0316', 400, 2]],
  ['plugCap', ['TH-0300-021', 1100, 2], ['AX-7754', 600, 4]],
  ['fuseSet', ['TM-0900-060', 900, 1], ['AX-5060', 400, 1]],
  ['crankSensorUnit', ['TH-0300-053', 6800, 2], ['AX-7763', 2900, 8]],
  ['carburettorKit', ['TH-0300-033', 3600, 1], ['AX-1630', 1600, 4]],
  ['fuelFilter', ['TH-0300-034', 900, 1], ['AX-2230', 400, 2]],
  ['airFilter', ['TH-0300-024', 2400, 1], ['AX-1430', 1200, 2]],
  ['intakeBoot', ['TH-0300-025', 2900, 1], ['AX-1530', 1600, 4]],
  ['battery12V', ['TH-0300-060', 9900, 3], ['AX-1230', 5900, 6]],
  ['batteryTerminal', ['TM-0900-061', 600, 1], ['AX-1231', 300, 1]],
  ['groundStrap', ['TH-0300-061', 1900, 1], ['AX-1206', 1100, 1]],
  ['stopSwitch', ['TH-0300-054', 3400, 1], ['AX-2930', 1500, 4]],
  ['recoilRope', ['TH-0300-045', 900, 1], ['AX-2845', 500, 3]],
  ['padSet', ['TH-0300-080', 3400, 1], ['AX-8030', 1700, 4]],
  ['wheelBearingSet', ['TH-0300-082', 4200, 1], ['AX-8230', 2100, 5]],
  ['fourWheelUnit', ['TH-0300-074', 26900, 3]],
])

/** Units 16 and 17 of the demo fleet: an air-cooled ATV with a carburettor and a shaft. Maker, model and every figure are invented. */
export const HEATH_300: MachineModel = {
  id: '01980000-0000-7000-8000-000000000208',
  maker: 'Tarnholt',
  model: 'Heath 300',
  features: {
    kind: 'atv',
    strokes: 'four',
    fuelling: 'carburettor',
    battery: 'yes',
    primesAtKeyOn: 'no',
    coilType: 'capacitive',
    cooling: 'air',
    drive: 'shaft',
    neutral: 'yes',
    electricStart: 'yes',
    handStart: 'recoil',
    electronicThrottle: 'no',
    steeringAssist: 'no',
    cylinders: 'one',
  },
  specSheet: {
    showCodes: {
      steps: ['The ignition box stores no codes. There is nothing to read out.'],
      clearSteps: ['Nothing to clear.'],
      source: page(4),
    },
    components: HEATH_300_COMPONENTS,
    cutOut: 'closesToStop',
    engagementRpm: 1800,
    massKg: 234,
    towPreparation:
      'Lever in neutral, switch at two-wheel drive, fuel tap shut. Tow by the front hitch at walking pace, nobody on it downhill without brakes.',
    parts: PARTS,
    demo: true,
  },
  source: 'demo, invented',
}
