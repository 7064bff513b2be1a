import type { MachineModel } from '@/lib/model/machine-model'
import { type DemoPart, page, SHOP_FIGURE } from './demo-figures'
import { SKERRY_250_CHASSIS } from './demo-skerry-250-chassis'
import { SKERRY_250_COMPONENTS } from './demo-skerry-250-components'

/** The parts the demo shop buys for this model; numbers, prices and failure shares are invented. */
const PARTS: DemoPart[] = [
  {
    part: 'ignitionCoil',
    genuineNumber: 'TS-2501-022',
    genuineMinor: 8400,
    aftermarketNumber: 'AX-7781',
    aftermarketMinor: 2900,
    genuineFailsOf100: 2,
    aftermarketFailsOf100: 9,
    source: SHOP_FIGURE,
  },
  {
    part: 'sparkPlug',
    genuineNumber: 'TS-2501-008',
    genuineMinor: 900,
    aftermarketNumber: 'AX-0314',
    aftermarketMinor: 600,
    genuineFailsOf100: 1,
    aftermarketFailsOf100: 2,
    source: SHOP_FIGURE,
  },
  {
    part: 'plugCap',
    genuineNumber: 'TS-2501-009',
    genuineMinor: 1500,
    aftermarketNumber: 'AX-7751',
    aftermarketMinor: 800,
    genuineFailsOf100: 2,
    aftermarketFailsOf100: 4,
    source: SHOP_FIGURE,
  },
  {
    part: 'carburettorKit',
    genuineNumber: 'TS-2501-016',
    genuineMinor: 3800,
    aftermarketNumber: 'AX-1616',
    aftermarketMinor: 1700,
    genuineFailsOf100: 1,
    aftermarketFailsOf100: 4,
    source: SHOP_FIGURE,
  },
  {
    part: 'crankSensorUnit',
    genuineNumber: 'TS-2501-023',
    genuineMinor: 7600,
    aftermarketNumber: null,
    aftermarketMinor: null,
    genuineFailsOf100: 2,
    aftermarketFailsOf100: null,
    source: SHOP_FIGURE,
  },
  {
    part: 'fuelFilter',
    genuineNumber: 'TS-2501-017',
    genuineMinor: 900,
    aftermarketNumber: 'AX-2217',
    aftermarketMinor: 400,
    genuineFailsOf100: 1,
    aftermarketFailsOf100: 2,
    source: SHOP_FIGURE,
  },
]

/** Unit 31 of the demo fleet: a two-stroke dirt bike with a carburettor and a kick lever. Maker, model and every figure are invented. */
export const SKERRY_250: MachineModel = {
  id: '01980000-0000-7000-8000-000000000203',
  maker: 'Tarnholt',
  model: 'Skerry 250',
  features: {
    kind: 'dirtBike',
    strokes: 'two',
    fuelling: 'carburettor',
    battery: 'no',
    primesAtKeyOn: 'no',
    coilType: 'capacitive',
    cooling: 'liquid',
    drive: 'chain',
    neutral: 'yes',
    electricStart: 'no',
    handStart: 'kick',
    electronicThrottle: 'no',
    steeringAssist: 'no',
    cylinders: 'one',
  },
  specSheet: {
    showCodes: {
      steps: ['This machine stores no codes. There is nothing to read out.'],
      clearSteps: ['Nothing to clear.'],
      source: page(4),
    },
    components: [...SKERRY_250_COMPONENTS, ...SKERRY_250_CHASSIS],
    cutOut: 'closesToStop',
    engagementRpm: null,
    massKg: 104,
    towPreparation:
      'Neutral, chain on. Rope to the left foot peg, turned once round so that it can be let go; walking pace.',
    parts: PARTS,
    demo: true,
  },
  source: 'demo, invented',
}
