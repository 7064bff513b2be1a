import { component, drop } from './demo-build'
import { brakePads } from './demo-common'
import {
  charging,
  engineGround,
  networkPair,
  sensorSupply,
  sleepCurrent,
  starter,
} from './demo-common-electrics'
import type { DemoComponent } from './demo-figures'

/** Drift 600, grounds, supplies, exhaust valves, drive and brake: where things are and what they read. All invented. */
export const DRIFT_600_MACHINE: DemoComponent[] = [
  engineGround({
    place: 'Black strap, battery to the rear of the crankcase.',
    setups: ['sidePanelOff'],
    page: 51,
  }),
  component({
    id: 'keySupply',
    name: 'Key switch and main relay',
    place: 'Key: console. Main relay: under the seat, beside the battery.',
    setups: ['seatOff'],
    fasteners: 'Push fit.',
    connector: 'Key: white, three pins.',
    pins: [
      ['1', 'red', 'battery plus'],
      ['2', 'red with black', 'to the main relay'],
      ['3', 'brown', 'start'],
    ],
    page: 52,
    values: [
      drop('drop', 'Volts lost over one contact', 0.2, 'Key on, heated grips on'),
      sleepCurrent(0.008),
    ],
  }),
  sensorSupply({
    place: 'Measured at the throttle sensor plug on the left throttle body.',
    setups: ['tankCoverOff'],
    page: 41,
  }),
  ...starter({
    relayPlace: 'Under the seat, beside the battery.',
    motorPlace: 'Front of the crankcase, right.',
    setups: ['seatOff'],
    page: 56,
  }),
  ...charging({
    place: 'Under the flywheel, behind the recoil; plug under the right panel.',
    regulatorPlace: 'On the front of the tunnel, left.',
    setups: ['sidePanelOff'],
    page: 54,
    leg: [0.28, 20],
    legAcVolts: 22,
    rpm: 3000,
  }),
  networkPair({
    place: 'Service plug under the console, right: pin 1 and pin 2.',
    setups: ['sidePanelOff'],
    page: 58,
    pins: ['1', '2'],
  }),
  component({
    id: 'exhaustValve1',
    name: 'Exhaust valves and servo',
    place: 'Front of the cylinders; servo behind the right panel, two cables.',
    setups: ['sidePanelOff', 'exhaustValveOpen'],
    fasteners: 'Cover: four bolts, 8 mm head. Springs hold the pipe.',
    connector: 'Servo: black, five pins.',
    torqueNm: 9,
    page: 36,
    values: [
      {
        id: 'cablePlay',
        name: 'Play of each cable, servo at rest',
        quantity: 'length',
        low: 1,
        high: 2,
      },
    ],
  }),
  component({
    id: 'driveBelt1',
    name: 'Drive belt',
    place: 'Left side, under the belt guard; the spare is in the tunnel bag.',
    setups: ['sidePanelOff', 'beltCoverOff'],
    fasteners: 'Guard: one pin.',
    page: 70,
    values: [{ id: 'width', name: 'Belt width, outside', quantity: 'length', low: 33 }],
  }),
  component({
    id: 'track',
    name: 'Track and slides',
    place: 'Under the tunnel; adjusters at the rear, left and right.',
    fasteners: 'Rear axle bolts 17 mm head, adjusters 13 mm.',
    torqueNm: 60,
    page: 75,
    values: [
      {
        id: 'sag',
        name: 'Sag of the track at the middle',
        quantity: 'length',
        low: 30,
        high: 40,
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
    place: 'Left of the tunnel, disc on the drive shaft.',
    page: 78,
    low: 1.5,
    torqueNm: 32,
  }),
]
