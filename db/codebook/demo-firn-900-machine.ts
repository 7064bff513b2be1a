import { component, drop } from './demo-build'
import { battery, brakePads, engineGround, sensorSupply } from './demo-common'
import type { DemoComponent } from './demo-figures'

/** Firn 900, battery, modules, drive and brakes: where things are and what they read. All invented. */
export const FIRN_900_MACHINE: DemoComponent[] = [
  battery({
    place: 'In the nose, left, under the side panel.',
    setups: ['sidePanelOff'],
    fasteners: 'One rubber strap.',
    page: 160,
    restLow: 12.5,
    crankingLow: 9.6,
  }),
  engineGround({
    place: 'Black strap, battery to the front engine mount.',
    setups: ['sidePanelOff'],
    page: 161,
  }),
  component({
    id: 'keySupply',
    name: 'Key switch and main relay',
    place: 'Key: console. Main relay: box beside the battery, place 2.',
    setups: ['sidePanelOff'],
    fasteners: 'Box lid: two clips.',
    connector: 'Key: white, four pins.',
    pins: [
      ['1', 'red', 'battery plus'],
      ['2', 'red with black', 'to the main relay'],
      ['3', 'brown with white', 'start'],
      ['4', 'black', 'ground of the key ring'],
    ],
    page: 162,
    values: [drop('drop', 'Volts lost over one contact', 0.2, 'Key on, heated grips on')],
  }),
  sensorSupply({
    place: 'Measured at the throttle body plug, pin 1 to pin 4.',
    setups: ['tankCoverOff'],
    page: 145,
  }),
  component({
    id: 'networkPair1',
    name: 'Network between the modules',
    place: 'Service plug in the nose, right: pin C and pin D.',
    setups: ['sidePanelOff'],
    connector: 'Black, nine pins, cap on a strap.',
    pins: [
      ['C', 'yellow', 'network plus'],
      ['D', 'green', 'network minus'],
    ],
    page: 170,
    values: [
      {
        id: 'pairResistance',
        name: 'Ohms across the pair',
        quantity: 'resistance',
        low: 55,
        high: 65,
        conditions: 'Key off for a minute, battery connected',
      },
    ],
  }),
  component({
    id: 'gripSensor1',
    name: 'Throttle lever sensor',
    place: 'In the right bar housing, two sensors in one.',
    fasteners: 'Housing: three screws.',
    connector: 'Black, six pins, behind the dash.',
    pins: [
      ['1', 'brown', '5 V supply'],
      ['2', 'green', 'signal 1'],
      ['3', 'green with red', 'signal 2, half of signal 1'],
      ['4', 'black with brown', 'sensor ground'],
    ],
    torqueNm: 2,
    page: 146,
    values: [
      {
        id: 'restSignal1',
        name: 'Signal 1, lever free',
        quantity: 'dcVoltage',
        low: 0.9,
        high: 1.1,
        conditions: 'Key on',
      },
      {
        id: 'restSignal2',
        name: 'Signal 2, lever free',
        quantity: 'dcVoltage',
        low: 0.45,
        high: 0.55,
        conditions: 'Key on',
      },
    ],
  }),
  component({
    id: 'stopSwitch',
    name: 'Stop switch and tether',
    place: 'Right bar; the tether clip is on the console. This circuit opens to stop.',
    fasteners: 'Two screws.',
    connector: 'White, four pins.',
    pins: [
      ['1', 'black with white', 'to the module'],
      ['2', 'black', 'ground'],
    ],
    torqueNm: 1,
    page: 163,
  }),
  component({
    id: 'driveBelt1',
    name: 'Drive belt',
    place: 'Left side, under the belt guard.',
    setups: ['sidePanelOff', 'beltCoverOff'],
    fasteners: 'Guard: two pins. The driven clutch is spread with the tool in the bag.',
    page: 180,
    values: [{ id: 'width', name: 'Belt width, outside', quantity: 'length', low: 35 }],
  }),
  component({
    id: 'track1',
    name: 'Track and slides',
    place: 'Under the tunnel; adjusters at the rear, left and right.',
    fasteners: 'Rear axle bolts 19 mm head, adjusters 13 mm.',
    torqueNm: 70,
    page: 185,
    values: [
      {
        id: 'sag',
        name: 'Sag of the track at the middle',
        quantity: 'length',
        low: 32,
        high: 42,
        conditions: 'Rear raised, 7 kg hung on the middle',
      },
      {
        id: 'slideThickness',
        name: 'Slide left at the thinnest place',
        quantity: 'length',
        low: 10,
      },
    ],
  }),
  brakePads({
    place: 'Left of the chain case, disc on the countershaft.',
    page: 190,
    low: 1.5,
    torqueNm: 36,
  }),
]
