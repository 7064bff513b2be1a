import { fault } from './draft'
import type { FaultData } from './fault-data'

/** What lying on its side or roof does to a machine, and fuel that got out. */
export const ROLL_FAULTS: FaultData[] = [
  fault({
    id: 'oilInAirbox',
    name: 'Oil run into air box or intake',
    system: 'airSystem',
    gate: { strokes: ['four'] },
    repair: {
      words:
        'Wipe box, boot and throttle body, wash or change the filter, dry the plug, set the oil level.',
      doesNotFix: 'Oil above the piston stays: plugs out and turn by hand first.',
      minutes: 25,
      costMinor: 300,
      part: 'airFilter',
      setups: ['airboxOpen'],
      successOf100: 90,
    },
    onset:
      'Lay on its side or roof; then smokes blue, fouls plugs or will not rev. Or was overfilled.',
    wayOut: 'repairHere',
    limpRefused: 'Oil above the piston: no cranking before the plugs are out.',
    provedBy: 'Smoke clears in some minutes, box stays dry, oil level right; then the proof run.',
  }),
  fault({
    id: 'barsBent',
    name: 'Bars, lever or pedal bent or broken',
    system: 'frameSystem',
    repair: {
      words:
        'Fit bars or levers. A lever that still works may be turned back on its clamp and tightened.',
      doesNotFix: 'Do not bend alloy bars back: they break later without a sign.',
      minutes: 40,
      part: 'handlebarSet',
      successOf100: 93,
    },
    onset: 'Fell on that side, or the rider hit the bars.',
    wayOut: 'tow',
    limpRefused: 'Bars cracked or loose, or no brake lever: no ride.',
    provedBy: 'Bars straight with the wheels, all clamps tight, levers move and return freely.',
  }),
  fault({
    id: 'frameBent',
    name: 'Frame, cage or seat mount bent or cracked',
    system: 'frameSystem',
    repair: {
      words: 'Shop repair by the maker’s manual: measure, change the section, never just hammer.',
      doesNotFix: 'Paint over a crack and a strap round a tube carry nobody.',
      minutes: 300,
      part: 'frameRepair',
      successOf100: 85,
    },
    onset: 'Hard roll, jump or a tree; doors or body no longer fit.',
    wayOut: 'tow',
    limpRefused: 'A bent cage or cracked frame does not protect a second time: no ride.',
    provedBy: 'Both diagonals equal, no crack found after cleaning, belts and seat mounts hold.',
  }),
  fault({
    id: 'fuelSpilt',
    name: 'Fuel spilt, no leak left behind',
    system: 'fuelSystem',
    repair: {
      words:
        'Wipe it up, take soaked rags away, air it for ten minutes and more, wash seat and clothes. Look again before the start.',
      doesNotFix: 'Does not cure a hose or cap that goes on leaking.',
      minutes: 20,
      costMinor: 50,
      successOf100: 95,
    },
    onset: 'Just filled, filled to the brim in the sun, or lay on its side.',
    wayOut: 'repairHere',
    limpRefused: 'Wet with fuel: no start, no key on.',
    provedBy: 'Dry paper under it stays dry for ten minutes and the smell is gone.',
  }),
  fault({
    id: 'fuelTankOrCapLeaks',
    name: 'Fuel tank, cap or vent hose leaking',
    system: 'fuelSystem',
    repair: {
      words:
        'New cap seal or vent hose. A split tank: drain below the split into a closed can; putty is to get home only.',
      doesNotFix: 'Does not cure a leak at the pump plate or fuel line.',
      minutes: 30,
      costMinor: 300,
      part: 'tankCap',
      setups: ['tankCoverOff'],
      successOf100: 88,
    },
    onset: 'After a roll, a rub on the frame, a new cap, or only with a full tank or on a slope.',
    wayOut: 'tow',
    limpRefused:
      'A fuel leak that cannot be stopped: no start, no ride, no tow with the engine running.',
    provedBy: 'Full and tilted both ways for some minutes, it stays dry; then the proof run.',
  }),
  fault({
    id: 'pumpPlateLeaks',
    name: 'Pump plate seal or rail joint leaking',
    system: 'fuelSystem',
    gate: { fuelling: ['injection'] },
    circuits: [{ circuit: 'fuelPressure', role: 'mechanism' }],
    repair: {
      words:
        'Let the pressure off, fit a new seal, tighten the ring or bolts crosswise, look with the pump on before any start.',
      doesNotFix: 'Tightening more does not cure a swollen or pinched seal.',
      minutes: 40,
      part: 'pumpPlateSeal',
      setups: ['tankCoverOff', 'railRelieved'],
      successOf100: 91,
    },
    onset: 'Smell with a full tank or when the pump runs; after pump or filter work.',
    wayOut: 'tow',
    limpRefused: 'A fuel leak under pressure: no start, no ride, no tow with the engine running.',
    provedBy: 'Dry round plate and joints with the pump on for a minute, tank full.',
  }),
  fault({
    id: 'fuelTapLeaks',
    name: 'Fuel tap weeping',
    system: 'fuelSystem',
    gate: { fuelling: ['carburettor'] },
    repair: {
      words:
        'Snug its screws; drain the tank into a closed can and fit a tap or seals. Drain first, then unscrew.',
      doesNotFix: 'Does not cure a float needle that lets fuel through.',
      minutes: 25,
      part: 'fuelTapPart',
      setups: ['tankCoverOff'],
      successOf100: 92,
    },
    onset: 'Old tap moved after a long rest; smell in the shed.',
    wayOut: 'repairHere',
    limpRefused:
      'A fuel leak that cannot be stopped: no start, no ride, no tow with the engine running.',
    provedBy: 'Dry on, off and on reserve for ten minutes; then the proof run.',
  }),
]
