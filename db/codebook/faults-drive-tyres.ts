import { fault } from './draft'
import type { FaultData } from './fault-data'
import { BIKE, WHEELED } from './gates-drive'

const FLAT_NO_RIDE =
  'Ridden flat it comes off the rim or throws the rider; a few metres to a safe spot only.'

/** Tyres, tubes and rims. */
export const TYRE_FAULTS: FaultData[] = [
  fault({
    id: 'tyrePunctured',
    name: 'Tyre punctured',
    system: 'wheelSystem',
    gate: WHEELED,
    repair: {
      words:
        'Tubeless: find the hole, plug it from outside, pump up. With a tube: patch or new tube.',
      doesNotFix: 'A plug does not hold in the side wall.',
      minutes: 18,
      costMinor: 100,
      part: 'tyrePlugs',
      successOf100: 88,
    },
    onset: 'Soft within minutes or overnight; nail, thorn or stick.',
    wayOut: 'repairHere',
    limpRefused: FLAT_NO_RIDE,
    provedBy: 'Pressure the same after a quarter of an hour and after the proof run.',
  }),
  fault({
    id: 'tyreBeadOff',
    name: 'Tyre bead off the rim',
    system: 'wheelSystem',
    gate: WHEELED,
    repair: {
      words:
        'Clean the seat, soap the bead, strap round the tread, pump until it seats, then set the pressure.',
      doesNotFix: 'A bent rim or a torn bead does not seal.',
      minutes: 20,
      costMinor: 20,
      successOf100: 82,
    },
    onset: 'Low pressure and a hard side load; flat at once.',
    wayOut: 'repairHere',
    limpRefused: FLAT_NO_RIDE,
    provedBy: 'Bead line even all round, pressure holds; then the proof run.',
  }),
  fault({
    id: 'valveLeaking',
    name: 'Tyre valve leaks or is torn',
    system: 'wheelSystem',
    gate: WHEELED,
    repair: {
      words: 'Tighten or change the core, cap on; a torn stem needs a stem or a tube.',
      doesNotFix: 'A cap alone holds only a slow leak.',
      minutes: 8,
      costMinor: 50,
      part: 'valveCore',
      successOf100: 88,
    },
    onset: 'Soft in days, or at once when a stick took the stem.',
    wayOut: 'repairHere',
    limpRefused: FLAT_NO_RIDE,
    provedBy: 'No bubbles at the valve, pressure holds.',
  }),
  fault({
    id: 'tyreTorn',
    name: 'Tyre torn or side wall cut',
    system: 'wheelSystem',
    gate: WHEELED,
    repair: {
      words:
        'Boot inside and several plugs only to reach the trailer at walking pace; else another wheel.',
      doesNotFix: 'A side wall that is mended stays a temporary measure.',
      minutes: 40,
      costMinor: 300,
      part: 'tyreCover',
      setups: ['wheelOff'],
      successOf100: 55,
    },
    onset: 'Flat at once on a sharp rock.',
    wayOut: 'tow',
    limpRefused: FLAT_NO_RIDE,
    provedBy: 'Whole tyre fitted, pressure holds; then the proof run.',
  }),
  fault({
    id: 'rimBent',
    name: 'Rim bent or cracked',
    system: 'wheelSystem',
    gate: WHEELED,
    repair: {
      words: 'Bend the lip back with care and seat the bead again; a crack means another wheel.',
      doesNotFix: 'Sealant does not hold a cracked rim.',
      minutes: 30,
      costMinor: 20,
      part: 'wheelRim',
      setups: ['wheelOff'],
      successOf100: 65,
    },
    onset: 'One hard edge; loses air again after each pumping.',
    wayOut: 'tow',
    limpRefused: 'No ride on a rim that is cracked or does not hold its air.',
    provedBy: 'Bead tight all round, wheel runs true; then the proof run.',
  }),
  fault({
    id: 'tubePinched',
    name: 'Inner tube pinched',
    system: 'wheelSystem',
    gate: BIKE,
    repair: {
      words: 'Two patches or a new tube, a little air in it before it goes in, levers clear of it.',
      doesNotFix: 'Too little pressure pinches the next one.',
      minutes: 30,
      costMinor: 50,
      part: 'innerTube',
      setups: ['tubeOut'],
      successOf100: 90,
    },
    onset: 'Hit a rock or a root edge; flat at once.',
    wayOut: 'repairHere',
    limpRefused: FLAT_NO_RIDE,
    provedBy: 'Pressure the same after a quarter of an hour and after the proof run.',
  }),
]
