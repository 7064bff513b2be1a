import type { ShareList } from './chapter'
import { columns, type ShareRow } from './shares-run'

const GROUPS: readonly Omit<ShareList, 'of100'>[] = [
  { symptom: 'runsRough', gate: { fuelling: ['injection'], strokes: ['four'] }, somethingElse: 8 },
  { symptom: 'runsRough', gate: { fuelling: ['injection'], strokes: ['two'] }, somethingElse: 8 },
  {
    symptom: 'runsRough',
    gate: { fuelling: ['carburettor'], strokes: ['four'] },
    somethingElse: 8,
  },
  { symptom: 'runsRough', gate: { fuelling: ['carburettor'], strokes: ['two'] }, somethingElse: 8 },
]

/** Columns: injection four-stroke, injection two-stroke, carburettor four-stroke, carburettor two-stroke. */
const ROWS: readonly ShareRow[] = [
  ['fuelStale', 6, 7, 9, 8],
  ['fuelFilterBlocked', 4, 4, 4, 3],
  ['tankVentBlocked', 2, 2, 3, 3],
  ['fuelPumpWeak', 7, 5, 0, 0],
  ['injectorBlocked', 6, 4, 0, 0],
  ['injectorCircuit', 3.5, 4, 0, 0],
  ['injectorLeaking', 2, 2, 0, 0],
  ['jetsBlocked', 0, 0, 21.5, 17],
  ['floatNeedleStuck', 0, 0, 6, 5],
  ['chokeWrong', 0, 0, 4, 4],
  ['pulsePumpWeak', 0, 0, 2, 3],
  ['sparkPlugBad', 9.5, 15, 10, 15],
  ['ignitionCoilPart', 5, 4, 3, 3],
  ['ignitionCoilWiring', 3.5, 3, 1.5, 1.5],
  ['ignitionCoilSupply', 2, 1, 0, 0],
  ['coilOutputLeaks', 4, 4, 4, 3.5],
  ['crankSensorWiring', 1.5, 1, 0.5, 0.5],
  ['groundPoor', 2, 1, 0.5, 0],
  ['sensorSupplyDown', 1.5, 1, 0, 0],
  ['airFilterBlocked', 5, 1.5, 8, 3],
  ['intakeIce', 0, 5, 0, 1],
  ['intakeLeak', 4, 5, 8, 7],
  ['idleAirStuck', 4, 2, 0, 0],
  ['mapSensorBad', 5, 3, 0, 0],
  ['throttleSensorBad', 3, 3, 0, 0],
  ['coolantSensorBad', 1.5, 1.5, 0, 0],
  ['airTempSensorBad', 1.5, 1.5, 0, 0],
  ['oxygenSensorBad', 2.5, 0, 0, 0],
  ['powerValveStuck', 0, 4, 0, 4],
  ['valveTight', 3, 0, 4, 0],
  ['lowCompression', 1.5, 2.5, 2, 4],
  ['crankSealLeak', 0, 2.5, 0, 3.5],
  ['reedBroken', 0, 1.5, 0, 2],
  ['headGasketLeaking', 1.5, 1, 1, 1],
]

/** What lies behind "runs rough or misfires". */
export const ROUGH_SHARES: ShareList[] = columns(GROUPS, ROWS)
