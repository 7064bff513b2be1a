import { component, drop, winding } from './demo-build'
import { engineOil } from './demo-common'
import type { DemoComponent } from './demo-figures'

const coil = (n: 1 | 2, colour: string): DemoComponent =>
  component({
    id: `ignitionCoil${n}`,
    name: `Ignition coil, cylinder ${n}`,
    place: `On the plug of cylinder ${n}, ${n === 1 ? 'rear' : 'front'}, under the cargo bed hatch.`,
    setups: ['seatOff', 'coilPlugOff'],
    fasteners: 'Hatch: four quarter turns. Coil: one bolt, 8 mm head.',
    connector: 'Grey, two pins, red slide lock.',
    pins: [
      ['1', 'red with white', 'feed, battery volts with key on'],
      ['2', colour, `control from module pin ${n === 1 ? '31' : '32'}`],
    ],
    torqueNm: 8,
    page: 212,
    values: [
      winding('primaryResistance', 'Primary resistance, pin 1 to pin 2', [0.62, 8]),
      drop(
        'supplyDrop',
        'Volts lost from battery plus to pin 1',
        0.4,
        'Key on, 21 W bulb from pin 1 to engine metal',
      ),
    ],
  })

const injector = (n: 1 | 2, colour: string): DemoComponent =>
  component({
    id: `injector${n}`,
    name: `Injector, cylinder ${n}`,
    place: `Intake port of cylinder ${n}, ${n === 1 ? 'rear' : 'front'}, under the fuel rail.`,
    setups: ['seatOff', 'railRelieved'],
    fasteners: 'Rail: two bolts, 10 mm head. Injector: clip, new seals.',
    connector: 'Blue, two pins.',
    pins: [
      ['1', 'red with white', 'feed'],
      ['2', colour, 'control'],
    ],
    torqueNm: 10,
    page: 224,
    values: [winding('resistance', 'Injector winding', [12.2, 5])],
  })

/** Fell 1000, engine and fuel: where things are and what they read. All invented. */
export const FELL_1000_ENGINE: DemoComponent[] = [
  coil(1, 'white with blue'),
  coil(2, 'white with red'),
  component({
    id: 'plug1',
    name: 'Spark plugs',
    place: 'Under the coils, one a cylinder.',
    setups: ['seatOff', 'plugOut'],
    fasteners: 'Plug hexagon 16 mm, engine cold.',
    torqueNm: 14,
    page: 211,
    values: [{ id: 'gap', name: 'Plug gap', quantity: 'length', low: 0.7, high: 0.8 }],
  }),
  injector(1, 'green with blue'),
  injector(2, 'green with red'),
  component({
    id: 'fuelPump',
    name: 'Fuel pump',
    place: 'In the tank under the right seat, from above, with its filter.',
    setups: ['seatOff', 'tankCoverOff'],
    fasteners: 'Ring nut, tool with four lugs. New ring seal.',
    connector: 'Black, four pins.',
    pins: [
      ['1', 'grey with blue', 'pump plus, from the relay'],
      ['2', 'black', 'pump ground'],
      ['3', 'violet', 'fuel level'],
      ['4', 'black with brown', 'level ground'],
    ],
    torqueNm: 68,
    page: 221,
    values: [
      {
        id: 'current',
        name: 'Current of the pump',
        quantity: 'dcCurrent',
        low: 3.5,
        high: 6,
        conditions: 'Pump running, 12.5 V',
      },
    ],
  }),
  component({
    id: 'fuelRail',
    name: 'Fuel rail',
    place: 'Between the cylinders, quick joint at its rear end.',
    setups: ['seatOff', 'railRelieved'],
    fasteners: 'Quick joint: press both tabs.',
    page: 222,
    values: [
      {
        id: 'pressure',
        name: 'Fuel pressure with the pump running',
        quantity: 'pressure',
        nominal: 350,
        tolerancePercent: 6,
        conditions: 'Pump running, engine off or idling',
      },
      {
        id: 'flow',
        name: 'Flow at the open rail joint',
        quantity: 'flow',
        low: 1.4,
        conditions: 'Pump running, battery above 12 V',
      },
    ],
  }),
  component({
    id: 'throttleBody',
    name: 'Throttle body with motor',
    place: 'Between air box and cylinders, motor to the left.',
    setups: ['seatOff', 'airboxOpen'],
    fasteners:
      'Four bolts, 8 mm head. After work: key on 30 seconds, off 10, so that it learns its stop.',
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
    page: 231,
    values: [
      {
        id: 'motorResistance',
        name: 'Throttle motor, pin 5 to pin 6',
        quantity: 'resistance',
        low: 1.2,
        high: 6,
        conditions: 'Unplugged; turn the flap a little and read again',
      },
      {
        id: 'signalSum',
        name: 'Signals A and B added',
        quantity: 'dcVoltage',
        low: 4.85,
        high: 5.15,
        conditions: 'Key on, at any place of the flap',
      },
    ],
  }),
  component({
    id: 'crankSensor',
    name: 'Crank position sensor',
    place: 'Left engine cover, front, above the starter.',
    setups: ['sidePanelOff', 'crankPlugOff'],
    fasteners: 'One bolt, 8 mm head.',
    connector: 'Black, two pins.',
    pins: [
      ['1', 'blue', 'signal plus'],
      ['2', 'blue with white', 'signal minus'],
    ],
    torqueNm: 8,
    page: 240,
    values: [
      winding('resistance', 'Sensor winding', [560, 15]),
      {
        id: 'crankingAcVolts',
        name: 'Peak volts while cranking',
        quantity: 'acVoltage',
        low: 0.7,
        conditions: 'Peak adapter, battery above 10 V while cranking',
      },
      { id: 'gap', name: 'Gap to the trigger wheel', quantity: 'length', low: 0.4, high: 1.1 },
    ],
  }),
  component({
    id: 'valves',
    name: 'Valves',
    place: 'Under the two valve covers.',
    setups: ['valveCoverOff'],
    fasteners: 'Cover: four bolts, 8 mm head, rubber gasket.',
    torqueNm: 10,
    page: 205,
    values: [
      {
        id: 'intakeGap',
        name: 'Intake valve gap, cold',
        quantity: 'length',
        low: 0.1,
        high: 0.2,
        conditions: 'Engine cold, 15 to 25 C',
      },
      {
        id: 'exhaustGap',
        name: 'Exhaust valve gap, cold',
        quantity: 'length',
        low: 0.2,
        high: 0.3,
        conditions: 'Engine cold, 15 to 25 C',
      },
    ],
  }),
  engineOil({ place: 'Switch on the right of the block, beside the filter.', page: 207, low: 60 }),
]
