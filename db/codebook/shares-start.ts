import type { ShareList } from './chapter'
import { columns, type ShareRow } from './shares-run'

const NO_CRANK_GROUPS: readonly Omit<ShareList, 'of100'>[] = [
  {
    symptom: 'noCrank',
    gate: { electricStart: ['yes'], battery: ['yes'], fuelling: ['injection'], strokes: ['four'] },
    somethingElse: 6,
  },
  {
    symptom: 'noCrank',
    gate: { electricStart: ['yes'], battery: ['yes'], fuelling: ['injection'], strokes: ['two'] },
    somethingElse: 8,
  },
  {
    symptom: 'noCrank',
    gate: { electricStart: ['yes'], battery: ['yes'], fuelling: ['carburettor'] },
    somethingElse: 6,
  },
]

/** Columns: injection four-stroke, injection two-stroke, carburettor. */
const NO_CRANK_ROWS: readonly ShareRow[] = [
  ['batteryLow', 20, 25, 22],
  ['batteryFailed', 13, 16, 14],
  ['batteryTerminalLoose', 9, 10, 10],
  ['groundPoor', 3, 3, 3.5],
  ['parasiticDrain', 3.5, 2, 1.5],
  ['mainFuseOpen', 4, 3, 5],
  ['mainRelayFault', 1.5, 1.5, 0],
  ['keySwitchHarness', 2.5, 2.5, 3.5],
  ['interlockOpen', 9, 2, 9],
  ['gearPositionBad', 3, 0, 0],
  ['stopCircuitFault', 3, 6, 2],
  ['securityRefuses', 2, 3, 0],
  ['startButtonFault', 5, 4, 6.5],
  ['starterRelayFault', 5.5, 4.5, 6.5],
  ['starterMotorWorn', 4, 4, 4.5],
  ['starterClutchSlips', 1, 1, 1],
  ['waterInElectrics', 2, 1, 1.5],
  ['controlModuleFault', 0.5, 0.5, 0],
  ['hydraulicLock', 1.5, 1, 2.5],
  ['engineSeized', 1, 2, 1],
]

const DEAD_GROUPS: readonly Omit<ShareList, 'of100'>[] = [
  {
    symptom: 'electricalDead',
    gate: { battery: ['yes'], fuelling: ['injection'] },
    somethingElse: 7,
  },
  {
    symptom: 'electricalDead',
    gate: { battery: ['yes'], fuelling: ['carburettor'] },
    somethingElse: 7,
  },
]

/** Columns: injection, carburettor. */
const DEAD_ROWS: readonly ShareRow[] = [
  ['batteryTerminalLoose', 21, 21],
  ['mainFuseOpen', 18, 22],
  ['batteryLow', 13, 13],
  ['batteryFailed', 8, 7],
  ['keySwitchHarness', 9, 13],
  ['mainRelayFault', 7, 1],
  ['groundPoor', 4, 5],
  ['parasiticDrain', 4.5, 3],
  ['waterInElectrics', 3, 3],
  ['stopCircuitFault', 2, 2],
  ['regulatorFailed', 2, 3],
  ['controlModuleFault', 1.5, 0],
]

/** What lies behind "starter does not turn the engine" and "electrics dead". */
export const START_SHARES: ShareList[] = [
  ...columns(NO_CRANK_GROUPS, NO_CRANK_ROWS),
  ...columns(DEAD_GROUPS, DEAD_ROWS),
]
