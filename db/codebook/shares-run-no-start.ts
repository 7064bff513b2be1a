import type { ShareList } from './chapter'
import { columns, type ShareRow } from './shares-run'

const GROUPS: readonly Omit<ShareList, 'of100'>[] = [
  {
    symptom: 'cranksNoStart',
    gate: { fuelling: ['injection'], strokes: ['four'] },
    somethingElse: 7,
  },
  {
    symptom: 'cranksNoStart',
    gate: { fuelling: ['injection'], strokes: ['two'] },
    somethingElse: 8,
  },
  {
    symptom: 'cranksNoStart',
    gate: { fuelling: ['carburettor'], strokes: ['four'] },
    somethingElse: 7,
  },
  {
    symptom: 'cranksNoStart',
    gate: { fuelling: ['carburettor'], strokes: ['two'] },
    somethingElse: 8,
  },
]

/** Columns: injection four-stroke, injection two-stroke, carburettor four-stroke, carburettor two-stroke. */
const ROWS: readonly ShareRow[] = [
  ['fuelOutOrShut', 9, 8.5, 9, 9],
  ['fuelStale', 4, 4.5, 9, 8],
  ['fuelLineIce', 0, 4, 0, 1],
  ['fuelFilterBlocked', 0, 2, 3, 3],
  ['fuelPumpDead', 7.5, 5.5, 0, 0],
  ['fuelPumpRelay', 6.5, 4.5, 0, 0],
  ['fuelPumpWiring', 4, 4, 0, 0],
  ['injectorCircuit', 1.5, 2, 0, 0],
  ['injectorLeaking', 2, 2, 0, 0],
  ['pulsePumpWeak', 0, 0, 3, 4],
  ['jetsBlocked', 0, 0, 13, 10],
  ['floatNeedleStuck', 0, 0, 5, 4],
  ['chokeWrong', 0, 0, 5, 5],
  ['cylinderFlooded', 6.5, 12, 7.5, 12],
  ['sparkPlugBad', 5, 8, 8, 10],
  ['ignitionCoilPart', 3.5, 3, 3, 3],
  ['ignitionCoilWiring', 2.5, 2, 1.5, 1.5],
  ['ignitionCoilSupply', 2, 1, 0.5, 0],
  ['ignitionCoilDriver', 0, 0, 2, 2],
  ['coilOutputLeaks', 1, 1.5, 2, 1.5],
  ['crankSensorPart', 4.5, 3.5, 1.5, 1.5],
  ['crankSensorWiring', 2.5, 2, 1, 1],
  ['tipOverTripped', 5, 1.5, 0, 0],
  ['stopCircuitFault', 8, 10.5, 7, 8],
  ['securityRefuses', 3.5, 3.5, 0, 0],
  ['batteryLow', 4, 1.5, 2, 0],
  ['keySwitchHarness', 1.5, 1, 1, 0.5],
  ['mainRelayFault', 2.5, 1, 0.5, 0],
  ['sensorSupplyDown', 1, 0, 0, 0],
  ['lowCompression', 1.5, 3, 2, 5],
  ['valveTight', 2, 0, 3, 0],
  ['camTimingSlipped', 2, 0, 1.5, 0],
  ['triggerWheelSlipped', 0, 0, 2, 2],
]

/** What lies behind "cranks, does not start". */
export const NO_START_SHARES: ShareList[] = columns(GROUPS, ROWS)
