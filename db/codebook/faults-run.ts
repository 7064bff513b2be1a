import { fault } from './draft'
import type { FaultData } from './fault-data'

/** Inside the engine, its timing, its fuel and its exhaust: what keeps it from running right. */
export const RUN_ENGINE_FAULTS: FaultData[] = [
  fault({
    id: 'cylinderFlooded',
    name: 'Cylinder flooded with fuel',
    system: 'fuelSystem',
    repair: {
      words:
        'Fuel off, throttle held wide open, crank ten seconds at a time to blow it out; then dry or change the plug.',
      doesNotFix:
        'Floods again if the choke stays on, the float needle leaks or the injector drips.',
      minutes: 15,
      part: 'sparkPlug',
      successOf100: 88,
    },
    onset:
      'Many tries with choke or throttle, a machine laid on its side, or a stalled cold start.',
    wayOut: 'repairHere',
    limpRefused: 'Locks solid on fuel when cranked: plug out first, or the rod bends.',
    provedBy: 'Starts on a dry plug and starts again when warm without choke; then the proof run.',
  }),
  fault({
    id: 'injectorLeaking',
    name: 'Injector dripping or stuck open',
    system: 'fuelSystem',
    gate: { fuelling: ['injection'] },
    circuits: [
      { circuit: 'injector1', role: 'mechanism' },
      { circuit: 'injector2', role: 'mechanism' },
      { circuit: 'injector3', role: 'mechanism' },
      { circuit: 'injector4', role: 'mechanism' },
      { circuit: 'fuelPressure', role: 'mechanism' },
    ],
    repair: {
      words:
        'Fit a good injector with new seals. Change the engine oil on a four-stroke if it smells of petrol.',
      doesNotFix: 'Dirt from a torn filter makes the next one drip too: fit a filter with it.',
      minutes: 35,
      part: 'injector',
      setups: ['tankCoverOff', 'railRelieved'],
      successOf100: 92,
    },
    onset: 'Long cranking after a short stop, black smoke at first, petrol in the oil.',
    wayOut: 'tow',
    limpRefused:
      'Petrol in the oil takes its strength, and a full cylinder bends the rod: no ride, no long cranking.',
    provedBy: 'Tip dry for a minute under pressure, pressure holds; then a hot restart.',
  }),
  fault({
    id: 'lowCompression',
    name: 'Low compression: rings, piston or cylinder worn',
    system: 'engineInside',
    repair: {
      words:
        'Shop job: piston, rings, cylinder. A worn two-stroke may start once more by a tow or a long pull.',
      doesNotFix: 'Oil in the plug hole starts it once and cures nothing.',
      minutes: 360,
      part: 'topEndKit',
      setups: ['engineCold'],
      successOf100: 85,
    },
    onset: 'Creeps up over a season; sudden after dust, overheating or a lean seizure.',
    wayOut: 'tow',
    limpRefused: 'Metal from a piston that has picked up goes through the engine: no ride.',
    provedBy:
      'Compression at the figure and alike on all cylinders; then a hot restart and proof run.',
  }),
  fault({
    id: 'camTimingSlipped',
    name: 'Cam chain or belt jumped',
    system: 'timingSystem',
    gate: { strokes: ['four'] },
    circuits: [
      { circuit: 'camSensor', role: 'mechanism' },
      { circuit: 'crankSensor', role: 'mechanism' },
    ],
    repair: {
      words:
        'Shop job: set the marks, fit chain and tensioner, look for bent valves before it turns.',
      doesNotFix: 'Setting the marks alone does not cure a worn tensioner or bent valves.',
      minutes: 240,
      part: 'timingChainSet',
      setups: ['valveCoverOff'],
      successOf100: 75,
    },
    onset: 'Rattle for weeks, then no start or no power after a stall, a backfire or a push start.',
    wayOut: 'tow',
    limpRefused: 'Valves may meet the piston: no more cranking, no ride.',
    provedBy: 'Marks in line after two turns by hand, compression back; then the proof run.',
  }),
  fault({
    id: 'triggerWheelSlipped',
    name: 'Flywheel key sheared or trigger wheel loose',
    system: 'timingSystem',
    circuits: [{ circuit: 'crankSensor', role: 'mechanism' }],
    repair: {
      words:
        'Pull the flywheel, fit a new key on clean dry cones, tighten to the figure with a torque wrench.',
      doesNotFix: 'A key alone does not last on a worn or wet cone.',
      minutes: 90,
      part: 'shaftKey',
      setups: ['flywheelCoverOff'],
      successOf100: 88,
    },
    onset: 'After a hard stop, a kickback, a prop of the drive, or work on the flywheel.',
    wayOut: 'tow',
    limpRefused: 'A loose flywheel breaks its cover: no ride, no more starts.',
    provedBy: 'Mark stands still where it should under a timing light; then the proof run.',
  }),
  fault({
    id: 'exhaustLeak',
    name: 'Exhaust joint leaking',
    system: 'airSystem',
    repair: {
      words: 'Fit a gasket, springs or clamp. A wrapped tin and wire is for the way home only.',
      doesNotFix: 'Does not cure a lean mixture, which bangs on the overrun too.',
      minutes: 25,
      part: 'exhaustGasketSet',
      setups: [],
      successOf100: 92,
    },
    onset: 'Ticking when cold, soot at a joint, a lost spring, after a fall or exhaust work.',
    wayOut: 'limpOut',
    limpRefused:
      'Hot gas on fuel hose, wiring, seat or dry grass burns: no ride before it points away.',
    provedBy: 'No puff at any joint with the end held half shut; then the proof run.',
  }),
  fault({
    id: 'powerValveStuck',
    name: 'Exhaust valve stuck or its cable off (two-stroke)',
    system: 'airSystem',
    gate: { strokes: ['two'] },
    circuits: [{ circuit: 'exhaustValve', role: 'mechanism' }],
    repair: {
      words: 'Take it out, free it of gum, set cable and stop marks. Fit the parts that are worn.',
      doesNotFix: 'Comes back soon with the wrong oil or a rich mixture.',
      minutes: 45,
      costMinor: 150,
      part: 'exhaustValveKit',
      setups: ['exhaustValveOpen'],
      successOf100: 88,
    },
    onset: 'Power goes flat in one half of the range, little by little over a season.',
    wayOut: 'limpOut',
    limpRefused: 'A broken blade can drop into the port: if it rattles, no start.',
    provedBy:
      'Moves from stop to stop by finger and by its servo; pulls through the range in the proof run.',
  }),
]
