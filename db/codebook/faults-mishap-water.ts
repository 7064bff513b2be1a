import { fault } from './draft'
import type { FaultData } from './fault-data'

/** What water does to a machine that went under. */
export const WATER_FAULTS: FaultData[] = [
  fault({
    id: 'waterInIntake',
    name: 'Water in the air box and intake',
    system: 'airSystem',
    repair: {
      words:
        'Drain box, boot and throttle body, wring or change the filter, dry all. Plugs out and turn by hand before any start.',
      doesNotFix: 'Does not get water out of cylinder, crankcase or oil: look there too.',
      minutes: 25,
      part: 'airFilter',
      setups: ['airboxOpen'],
      successOf100: 86,
    },
    onset: 'Water over the seat or a bow wave into the snorkel; died in the water.',
    wayOut: 'repairHere',
    limpRefused: 'Water on the engine side of the filter: no cranking before the plugs are out.',
    provedBy:
      'Box and boot dry after ten minutes of running, no water from the drain; then the proof run.',
  }),
  fault({
    id: 'waterInOil',
    name: 'Water in the engine or gear oil',
    system: 'oilSystem',
    repair: {
      words:
        'Drain while it has settled, fill fresh oil and filter, run short, drain and fill again until it stays clear.',
      doesNotFix: 'Does not cure a head gasket or water seal that lets coolant into the oil.',
      minutes: 45,
      costMinor: 1500,
      part: 'engineOil',
      successOf100: 82,
    },
    onset: 'Stood under water, breather under water, or cooled fast in a stream.',
    wayOut: 'tow',
    limpRefused:
      'Milky oil does not carry the bearings: no start, no ride before the oil is changed.',
    provedBy: 'Oil stays clear and the level steady after the second filling and a warm run.',
  }),
  fault({
    id: 'waterInCrankcase',
    name: 'Water in the crankcase (two-stroke)',
    system: 'engineInside',
    gate: { strokes: ['two'] },
    repair: {
      words:
        'Plugs out, fuel shut. Tip it, or open the case drain, turn by hand till no more comes. Oil in the plug hole, new plugs.',
      doesNotFix: 'Does not save crank bearings left wet for days: strip it if it lay long.',
      minutes: 40,
      costMinor: 200,
      part: 'sparkPlug',
      setups: ['plugOut'],
      successOf100: 78,
    },
    onset: 'Ran into water, or lay under; bangs wet plugs each time it is turned.',
    wayOut: 'repairHere',
    limpRefused: 'Wet bearings without oil are ruined: run it up only when the case is drained.',
    provedBy: 'Plugs stay dry after ten pulls, it clears its smoke; then the proof run.',
  }),
  fault({
    id: 'waterInElectrics',
    name: 'Water in plugs, switches or fuse box',
    system: 'powerSystem',
    gate: { battery: ['yes'] },
    circuits: [
      { circuit: 'systemVoltage', role: 'wiring' },
      { circuit: 'sensorSupply', role: 'wiring' },
      { circuit: 'controlModule', role: 'wiring' },
    ],
    repair: {
      words:
        'Key off, battery off. Part each wet plug, shake and blow it out, dry it, grease the seal, press it home.',
      doesNotFix: 'Green pins come back in weeks: renew those later.',
      minutes: 40,
      costMinor: 200,
      part: 'connectorKit',
      setups: ['seatOff'],
      successOf100: 80,
    },
    onset: 'Odd lamps, a fan or pump that runs by itself, codes for many circuits at once.',
    wayOut: 'repairHere',
    limpRefused: 'A wire or fuse that gets hot: battery off, no ride.',
    provedBy: 'All plugs dry, codes cleared stay away through a warm run and a splash.',
  }),
  fault({
    id: 'rodBent',
    name: 'Rod bent by water or liquid in the cylinder',
    system: 'engineInside',
    repair: {
      words: 'Not a trail repair: the engine comes apart for rod, crank and piston.',
      doesNotFix: 'Fresh oil and dry plugs do not cure it.',
      minutes: 600,
      part: 'rodAndBearings',
      successOf100: 88,
    },
    onset: 'Stopped dead in the water, or was cranked while full; weak, shakes or knocks since.',
    wayOut: 'tow',
    limpRefused: 'A bent rod breaks through the case: no start, no ride.',
    provedBy: 'Piston comes up to its full height and compression is back after the rebuild.',
  }),
]
