import { component, drop, winding } from './demo-build'
import { engineOil } from './demo-common'
import type { DemoComponent } from './demo-figures'

const coil = (n: 1 | 2 | 3, colour: string): DemoComponent =>
  component({
    id: `ignitionCoil${n}`,
    name: `Ignition coil, cylinder ${n}`,
    place: `On the plug of cylinder ${n}, counted from the left, under the console.`,
    setups: ['tankCoverOff', 'coilPlugOff'],
    fasteners: 'Console: three quarter turns. Coil: one bolt, 8 mm head.',
    connector: 'Black, two pins, slide lock.',
    pins: [
      ['1', 'red with white', 'feed, battery volts with key on'],
      ['2', colour, 'control'],
    ],
    torqueNm: 8,
    page: 131,
    values: [
      winding('primaryResistance', 'Primary resistance, pin 1 to pin 2', [0.8, 8]),
      drop(
        'supplyDrop',
        'Volts lost from battery plus to pin 1',
        0.4,
        'Key on, 21 W bulb from pin 1 to engine metal',
      ),
    ],
  })

/** Firn 900, engine and fuel: where things are and what they read. All invented. */
export const FIRN_900_ENGINE: DemoComponent[] = [
  coil(1, 'white with blue'),
  coil(2, 'white with green'),
  coil(3, 'white with red'),
  component({
    id: 'injector1',
    name: 'Injectors, cylinders 1 to 3',
    place: 'Behind the throttle body, on one rail; number 1 is on the left.',
    setups: ['tankCoverOff', 'railRelieved'],
    fasteners: 'Rail: three bolts, 10 mm head.',
    connector: 'Grey, two pins each.',
    pins: [
      ['1', 'red with white', 'feed'],
      ['2', 'green', 'control, a stripe for each cylinder'],
    ],
    torqueNm: 10,
    page: 140,
    values: [winding('resistance', 'Injector winding', [12, 6])],
  }),
  component({
    id: 'fuelRail',
    name: 'Fuel rail',
    place: 'Behind the throttle body, quick joint on the right.',
    setups: ['tankCoverOff', 'railRelieved'],
    fasteners: 'Quick joint: press both tabs.',
    page: 141,
    values: [
      {
        id: 'pressure',
        name: 'Fuel pressure with the pump running',
        quantity: 'pressure',
        nominal: 400,
        tolerancePercent: 6,
        conditions: 'Pump running',
      },
      {
        id: 'flow',
        name: 'Flow at the open rail joint',
        quantity: 'flow',
        low: 1.6,
        conditions: 'Pump running, battery above 12 V',
      },
    ],
  }),
  component({
    id: 'throttleBody',
    name: 'Throttle body with motor',
    place: 'Top of the engine, under the air box.',
    setups: ['tankCoverOff', 'airboxOpen'],
    fasteners: 'Three bolts, 8 mm head. It learns its stop at key on, bar lever free.',
    connector: 'Black, six pins.',
    pins: [
      ['1', 'brown', '5 V supply'],
      ['2', 'yellow with white', 'throttle signal A'],
      ['3', 'yellow with black', 'throttle signal B, falls as A rises'],
      ['4', 'black with brown', 'sensor ground'],
      ['5', 'pink', 'motor plus'],
      ['6', 'pink with black', 'motor minus'],
    ],
    torqueNm: 9,
    page: 145,
    values: [
      {
        id: 'motorResistance',
        name: 'Throttle motor, pin 5 to pin 6',
        quantity: 'resistance',
        low: 1,
        high: 5,
        conditions: 'Unplugged; turn the flap a little and read again',
      },
    ],
  }),
  component({
    id: 'crankSensor',
    name: 'Crank position sensor',
    place: 'Front of the block, low, behind the belly pan flap.',
    setups: ['sidePanelOff', 'crankPlugOff'],
    fasteners: 'One bolt, 8 mm head.',
    connector: 'Black, two pins.',
    pins: [
      ['1', 'blue', 'signal plus'],
      ['2', 'blue with white', 'signal minus'],
    ],
    torqueNm: 8,
    page: 150,
    values: [
      winding('resistance', 'Sensor winding', [870, 12]),
      {
        id: 'crankingAcVolts',
        name: 'Peak volts while cranking',
        quantity: 'acVoltage',
        low: 0.9,
        conditions: 'Peak adapter, battery above 10 V while cranking',
      },
    ],
  }),
  component({
    id: 'coolantSensor',
    name: 'Engine temperature sensor',
    place: 'Right end of the head, under the hose to the tunnel.',
    setups: ['sidePanelOff', 'engineCold'],
    fasteners: 'Hexagon 19 mm, new washer.',
    connector: 'Green, two pins.',
    pins: [
      ['1', 'yellow with green', 'signal'],
      ['2', 'black with brown', 'sensor ground'],
    ],
    torqueNm: 16,
    page: 152,
    values: [
      {
        id: 'resistance20',
        name: 'Sensor at 20 C',
        quantity: 'resistance',
        nominal: 2500,
        tolerancePercent: 8,
        partTempC: 20,
        material: 'ntc',
        conditions: 'Sensor and metal at 20 C',
      },
      {
        id: 'resistance80',
        name: 'Sensor at 80 C',
        quantity: 'resistance',
        nominal: 325,
        tolerancePercent: 8,
        partTempC: 80,
        material: 'ntc',
        conditions: 'Sensor and metal at 80 C',
      },
    ],
  }),
  component({
    id: 'heatExchanger1',
    name: 'Snow heat exchangers',
    place: 'Under the tunnel, front and both sides; bleed screw at the front end.',
    fasteners: 'Bleed screw: 10 mm head, engine cold.',
    torqueNm: 6,
    page: 154,
    values: [
      {
        id: 'warnTemperature',
        name: 'Coolant temperature at which the lamp comes on',
        quantity: 'temperature',
        low: 100,
        high: 105,
      },
    ],
  }),
  engineOil({ place: 'Switch above the oil filter, left front.', page: 156, low: 70 }),
]
