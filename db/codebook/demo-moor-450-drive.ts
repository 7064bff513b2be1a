import { component, drop } from './demo-build'
import { brakePads, engineOil, tyres } from './demo-common'
import { charging, networkPair, starter } from './demo-common-electrics'
import type { DemoComponent } from './demo-figures'

/** Moor 450, oil, drive, cooling and brakes: where things are and what they read. All invented. */
export const MOOR_450_DRIVE: DemoComponent[] = [
  engineOil({ place: 'Switch on the left engine cover, above the filter.', page: 26, low: 50 }),
  component({
    id: 'driveBelt1',
    name: 'Drive belt',
    place: 'Left side, under the belt cover; its air duct ends under the seat.',
    setups: ['sidePanelOff', 'beltCoverOff'],
    fasteners: 'Cover: ten bolts, 8 mm head.',
    torqueNm: 5,
    page: 100,
    values: [
      {
        id: 'width',
        name: 'Belt width, outside',
        quantity: 'length',
        low: 28.5,
        conditions: 'Squeezed by hand, at three places',
      },
    ],
  }),
  component({
    id: 'fourWheelUnitFront',
    name: 'Front drive unit',
    place: 'On the front gearcase, right side.',
    setups: ['frontCoverOff'],
    fasteners: 'Three bolts, 8 mm head.',
    connector: 'Black, two pins.',
    pins: [
      ['1', 'grey with white', 'feed with the switch at four'],
      ['2', 'black', 'ground'],
    ],
    torqueNm: 9,
    page: 104,
    values: [
      drop('supplyDrop', 'Volts lost from battery to its plug', 0.5, 'Key on, switch at four'),
    ],
  }),
  component({
    id: 'radiator1',
    name: 'Radiator and fan',
    place: 'Behind the front bumper; cap under the front cover.',
    setups: ['frontCoverOff'],
    fasteners: 'Fan: three bolts, 8 mm head.',
    connector: 'Fan: black, two pins.',
    pins: [
      ['1', 'blue with white', 'fan plus, from the relay'],
      ['2', 'black', 'ground'],
    ],
    torqueNm: 8,
    page: 80,
    values: [
      {
        id: 'capPressure',
        name: 'Pressure the cap opens at',
        quantity: 'pressure',
        low: 90,
        high: 120,
        conditions: 'Cold, with a hand pump',
      },
    ],
  }),
  ...starter({
    relayPlace: 'Under the seat, beside the battery.',
    motorPlace: 'Front of the engine, left, below the cylinder.',
    setups: ['seatOff'],
    page: 78,
  }),
  ...charging({
    place: 'Under the flywheel, left; plug behind the left side panel.',
    regulatorPlace: 'Front, under the headlamp, fins forward.',
    setups: ['sidePanelOff'],
    page: 76,
    leg: [0.32, 20],
    legAcVolts: 18,
    rpm: 1700,
  }),
  networkPair({
    place: 'Service plug under the seat, beside the module: pin 1 and pin 2.',
    setups: ['seatOff'],
    page: 91,
    pins: ['1', '2'],
  }),
  tyres({ place: 'Front and rear alike.', page: 112, kPa: [32, 40] }),
  brakePads({ place: 'Both front wheels, seen from behind.', page: 110, low: 1, torqueNm: 32 }),
]
