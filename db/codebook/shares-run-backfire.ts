import type { ShareList } from './chapter'
import { columns, type ShareRow } from './shares-run'

const GROUPS: readonly Omit<ShareList, 'of100'>[] = [
  { symptom: 'backfires', gate: { fuelling: ['injection'], strokes: ['four'] }, somethingElse: 8 },
  { symptom: 'backfires', gate: { fuelling: ['injection'], strokes: ['two'] }, somethingElse: 9 },
  {
    symptom: 'backfires',
    gate: { fuelling: ['carburettor'], strokes: ['four'] },
    somethingElse: 8,
  },
  { symptom: 'backfires', gate: { fuelling: ['carburettor'], strokes: ['two'] }, somethingElse: 9 },
]

/** Columns: injection four-stroke, injection two-stroke, carburettor four-stroke, carburettor two-stroke. */
const ROWS: readonly ShareRow[] = [
  ['intakeLeak', 13, 13, 13, 14],
  ['exhaustLeak', 16, 8, 12, 8],
  ['fuelStale', 6, 7, 7, 8],
  ['fuelFilterBlocked', 4, 5, 3, 3],
  ['fuelPumpWeak', 7, 7, 0, 0],
  ['injectorBlocked', 5, 5, 0, 0],
  ['jetsBlocked', 0, 0, 16, 13],
  ['chokeWrong', 0, 0, 3, 3],
  ['pulsePumpWeak', 0, 0, 2, 3],
  ['cylinderFlooded', 2, 4, 3, 4],
  ['sparkPlugBad', 6, 8, 6, 8],
  ['ignitionCoilPart', 3.5, 4, 3, 3],
  ['ignitionCoilWiring', 3.5, 3, 2, 2],
  ['coilOutputLeaks', 3, 4, 4, 3],
  ['crankSensorWiring', 2.5, 3, 1.5, 2],
  ['triggerWheelSlipped', 2.5, 4, 4, 6],
  ['stopCircuitFault', 2, 4, 2.5, 2],
  ['camTimingSlipped', 4, 0, 3.5, 0],
  ['valveTight', 6, 0, 6.5, 0],
  ['mapSensorBad', 3.5, 3, 0, 0],
  ['oxygenSensorBad', 2.5, 0, 0, 0],
  ['reedBroken', 0, 4, 0, 4],
  ['crankSealLeak', 0, 5, 0, 5],
]

/** What lies behind "backfires". */
export const BACKFIRE_SHARES: ShareList[] = columns(GROUPS, ROWS)
