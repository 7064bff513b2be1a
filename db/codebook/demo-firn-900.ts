import type { MachineModel } from '@/lib/model/machine-model'
import { demoParts } from './demo-build'
import { page } from './demo-figures'
import { FIRN_900_ENGINE } from './demo-firn-900-engine'
import { FIRN_900_MACHINE } from './demo-firn-900-machine'

/** The parts the demo shop buys for this model; numbers, prices and failure shares are invented. */
const PARTS = demoParts([
  ['ignitionCoil', ['TN-0900-131', 14900, 2], ['AX-7795', 5200, 9]],
  ['sparkPlug', ['TN-0900-130', 1800, 1], ['AX-0325', 1000, 2]],
  ['relay', ['TM-0900-075', 2200, 1], ['AX-5104', 800, 3]],
  ['fuseSet', ['TM-0900-060', 900, 1], ['AX-5060', 400, 1]],
  ['injector', ['TN-0900-140', 16900, 2]],
  ['fuelPumpUnit', ['TN-0900-142', 46900, 3], ['AX-2290', 20900, 12]],
  ['fuelFilter', ['TN-0900-143', 4200, 1], ['AX-2293', 1900, 3]],
  ['crankSensorUnit', ['TN-0900-150', 10900, 2]],
  ['coolantSensorUnit', ['TN-0900-152', 3900, 1], ['AX-1529', 1600, 4]],
  ['throttleBodyUnit', ['TN-0900-145', 72900, 2]],
  ['gripUnit', ['TN-0900-146', 24900, 3]],
  ['battery12V', ['TN-0900-160', 15900, 3], ['AX-1295', 8900, 6]],
  ['groundStrap', ['TN-0900-161', 2600, 1], ['AX-1209', 1200, 1]],
  ['stopSwitch', ['TN-0900-163', 5600, 1]],
  ['codedKey', ['TN-0900-164', 8900, 1]],
  ['driveBelt', ['TN-0900-180', 17900, 2], ['AX-1809', 9200, 9]],
  ['slideSet', ['TN-0900-185', 6400, 1], ['AX-1859', 3300, 3]],
  ['padSet', ['TN-0900-190', 5900, 1], ['AX-1909', 2800, 4]],
])

/** Unit 24 of the demo fleet: a four-stroke snowmobile, three cylinders, electronic throttle. Maker, model and every figure are invented. */
export const FIRN_900: MachineModel = {
  id: '01980000-0000-7000-8000-000000000207',
  maker: 'Tarnholt',
  model: 'Firn 900',
  features: {
    kind: 'snowmobile',
    strokes: 'four',
    fuelling: 'injection',
    battery: 'yes',
    primesAtKeyOn: 'yes',
    coilType: 'inductive',
    cooling: 'snow',
    drive: 'belt',
    neutral: 'no',
    electricStart: 'yes',
    handStart: 'none',
    electronicThrottle: 'yes',
    steeringAssist: 'no',
    cylinders: 'more',
  },
  specSheet: {
    showCodes: {
      steps: [
        'Tether in, key on, engine off.',
        'Hold the lower dash button until "dia" shows, about seven seconds.',
        'Number and kind show one after the other, three seconds each.',
        'Press the button once for the next code; "0000" means no more codes.',
        'Photograph each page before the key goes off.',
      ],
      clearSteps: [
        'Record every code first. A cleared code does not come back on its own.',
        'At "0000" hold the button for ten seconds, until the display goes blank.',
        'Key off for twenty seconds. Start it and show the codes again.',
      ],
      source: page(195),
    },
    components: [...FIRN_900_ENGINE, ...FIRN_900_MACHINE],
    cutOut: 'opensToStop',
    engagementRpm: 2600,
    massKg: 291,
    towPreparation:
      'Belt off: it has no neutral. On a deck or on rollers under the track; on a bar at walking pace, nobody on it downhill. The brake acts through the chain case: with a broken chain there is none, so try it first.',
    parts: PARTS,
    demo: true,
  },
  source: 'demo, invented',
}
