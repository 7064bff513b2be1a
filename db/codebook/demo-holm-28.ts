import type { MachineModel } from '@/lib/model/machine-model'
import { component, demoParts, winding } from './demo-build'
import { type DemoComponent, page } from './demo-figures'

const COMPONENTS: DemoComponent[] = [
  component({
    id: 'ignitionCoil1',
    name: 'Ignition coil on the flywheel rim',
    place: 'Under the fan cowl, beside the flywheel; coil and ignition box in one.',
    setups: ['sidePanelOff', 'coilPlugOff'],
    fasteners: 'Cowl: four bolts, 10 mm head. Coil: two bolts, 8 mm head.',
    connector: 'One blade.',
    pins: [['1', 'black', 'stop wire: to ground it stops']],
    torqueNm: 9,
    page: 18,
    values: [
      winding('primaryResistance', 'Primary resistance, blade to iron core', [0.9, 20]),
      { id: 'gap', name: 'Gap to the flywheel magnets', quantity: 'length', low: 0.25, high: 0.4 },
    ],
  }),
  component({
    id: 'plug1',
    name: 'Spark plug',
    place: 'Front of the head.',
    setups: ['plugOut'],
    fasteners: 'Plug hexagon 21 mm, engine cold.',
    torqueNm: 20,
    page: 9,
    values: [{ id: 'gap', name: 'Plug gap', quantity: 'length', low: 0.7, high: 0.8 }],
  }),
  component({
    id: 'carburettor1',
    name: 'Carburettor and tap',
    place: 'Behind the air box, tap below the tank.',
    setups: ['carburettorOff'],
    fasteners: 'Two nuts, 10 mm; bowl: one bolt, 10 mm head.',
    torqueNm: 9,
    page: 14,
  }),
  component({
    id: 'airBox',
    name: 'Air box and filter',
    place: 'Rear, behind one clip; foam.',
    setups: ['airboxOpen'],
    fasteners: 'One clip.',
    page: 11,
  }),
  component({
    id: 'valves',
    name: 'Valves',
    place: 'Under the cover on the head.',
    setups: ['valveCoverOff'],
    fasteners: 'Cover: four bolts, 10 mm head, new gasket.',
    torqueNm: 8,
    page: 22,
    values: [
      {
        id: 'intakeGap',
        name: 'Intake valve gap, cold',
        quantity: 'length',
        low: 0.13,
        high: 0.17,
        conditions: 'Engine cold, piston at the top',
      },
      {
        id: 'exhaustGap',
        name: 'Exhaust valve gap, cold',
        quantity: 'length',
        low: 0.18,
        high: 0.22,
        conditions: 'Engine cold, piston at the top',
      },
    ],
  }),
  component({
    id: 'oilSwitch1',
    name: 'Low-oil switch',
    place: 'In the crankcase, rear; its yellow wire stops the ignition when oil is low.',
    fasteners: 'Two bolts, 10 mm head.',
    connector: 'One blade.',
    pins: [['1', 'yellow', 'to the stop wire; closes to ground with low oil']],
    torqueNm: 9,
    page: 20,
  }),
  component({
    id: 'stopSwitch',
    name: 'Stop switch',
    place: 'Front panel. This circuit closes to stop: open in run.',
    fasteners: 'One ring nut.',
    connector: 'Two blades.',
    pins: [
      ['1', 'black', 'to the coil'],
      ['2', 'green', 'ground'],
    ],
    page: 19,
  }),
  component({
    id: 'recoil1',
    name: 'Recoil starter',
    place: 'On the fan cowl.',
    fasteners: 'Three bolts, 10 mm head. Pre-load: three turns of the sheave.',
    torqueNm: 6,
    page: 25,
  }),
]

/** The parts the demo shop buys for this model; numbers, prices and failure shares are invented. */
const PARTS = demoParts([
  ['ignitionCoil', ['TL-0028-018', 5200, 2], ['AX-7728', 1900, 7]],
  ['sparkPlug', ['TL-0028-009', 600, 1], ['AX-0318', 300, 2]],
  ['plugCap', ['TL-0028-010', 700, 2], ['AX-7755', 400, 4]],
  ['carburettorKit', ['TL-0028-014', 2400, 1], ['AX-1428', 1100, 5]],
  ['fuelFilter', ['TL-0028-015', 500, 1], ['AX-2228', 300, 2]],
  ['airFilter', ['TL-0028-011', 900, 1], ['AX-1128', 500, 2]],
  ['stopSwitch', ['TL-0028-019', 1400, 1]],
  ['recoilRope', ['TL-0028-025', 600, 1], ['AX-2528', 300, 3]],
  ['recoilSpringPart', ['TL-0028-026', 1200, 2], ['AX-2628', 700, 6]],
])

/** Unit 51 of the demo fleet: the engine of the camp's lighting set. Maker, model and every figure are invented. */
export const HOLM_28: MachineModel = {
  id: '01980000-0000-7000-8000-000000000210',
  maker: 'Tarnholt',
  model: 'Holm 28',
  features: {
    kind: 'smallEngine',
    strokes: 'four',
    fuelling: 'carburettor',
    battery: 'no',
    primesAtKeyOn: 'no',
    coilType: 'capacitive',
    cooling: 'air',
    drive: 'shaft',
    neutral: 'no',
    electricStart: 'no',
    handStart: 'recoil',
    electronicThrottle: 'no',
    steeringAssist: 'no',
    cylinders: 'one',
  },
  specSheet: {
    showCodes: {
      steps: ['This engine stores no codes. There is nothing to read out.'],
      clearSteps: ['Nothing to clear.'],
      source: page(4),
    },
    components: COMPONENTS,
    cutOut: 'closesToStop',
    engagementRpm: null,
    massKg: 44,
    towPreparation:
      'Fuel tap shut, cables off, engine cold. Two people lift it by the frame; carry it upright, never on its side.',
    parts: PARTS,
    demo: true,
  },
  source: 'demo, invented',
}
