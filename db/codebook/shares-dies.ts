import type { ShareList } from './chapter'

/** The groups of machines that were thought of one by one, in the order of the columns below. */
const GROUPS: readonly Omit<ShareList, 'of100'>[] = [
  {
    symptom: 'startsThenDies',
    gate: { fuelling: ['injection'], strokes: ['four'] },
    somethingElse: 7,
  },
  {
    symptom: 'startsThenDies',
    gate: { fuelling: ['injection'], strokes: ['two'] },
    somethingElse: 8,
  },
  {
    symptom: 'startsThenDies',
    gate: { fuelling: ['carburettor'] },
    somethingElse: 8,
  },
]

type Row = readonly [
  fault: string,
  injectionFour: number,
  injectionTwo: number,
  carburettor: number,
]

/**
 * Shares of 100, one column per group; 0 means the fault is not on that list. A column and its
 * "something else" add to 100. Guesses of people who do the work, no count behind them: the shop's
 * own closed jobs replace them (rule R5, 20 pseudo-jobs).
 */
const ROWS: readonly Row[] = [
  // fuel
  ['fuelOutOrShut', 7, 8, 12],
  ['fuelStale', 5, 6, 11],
  ['fuelLineIce', 0, 5, 0],
  ['fuelFilterBlocked', 6, 5, 6],
  ['tankVentBlocked', 4, 4, 7],
  ['fuelPumpWeak', 5, 5, 0],
  ['fuelPumpDead', 3, 3, 0],
  ['fuelPumpRelay', 3, 2.5, 0],
  ['fuelPumpWiring', 3, 3, 0],
  ['fuelRegulatorLeak', 2, 1.5, 0],
  ['injectorBlocked', 1, 1, 0],
  ['injectorCircuit', 2, 2, 0],
  ['fuelHoseLeak', 1, 1, 1],
  ['pulsePumpWeak', 0, 0, 6],
  ['jetsBlocked', 0, 0, 17],
  ['floatNeedleStuck', 0, 0, 5],
  ['chokeWrong', 0, 0, 4],
  // ignition
  ['sparkPlugBad', 4, 5, 5],
  ['ignitionCoilPart', 5, 4, 2],
  ['ignitionCoilWiring', 4, 3, 1],
  ['ignitionCoilSupply', 2, 1, 0.5],
  ['ignitionCoilDriver', 1, 1, 1],
  ['coilOutputLeaks', 2, 2, 1.5],
  // crank signal
  ['crankSensorPart', 3, 2.5, 1.5],
  ['crankSensorWiring', 2, 1.5, 0.5],
  // stop and safety circuits
  ['tipOverTripped', 3, 1, 0],
  ['stopCircuitFault', 4, 6, 4],
  // battery and power
  ['batteryLow', 2, 1, 0],
  ['batteryTerminalLoose', 3, 1, 0],
  ['groundPoor', 1, 1, 0.5],
  ['keySwitchHarness', 2, 2, 0.5],
  ['mainRelayFault', 2, 1, 0],
  ['sensorSupplyDown', 1, 1, 0],
  ['controlModuleFault', 0.5, 0.5, 0],
  // air and exhaust
  ['airFilterBlocked', 2, 0.5, 2],
  ['intakeIce', 0, 3, 0],
  ['intakeLeak', 1, 1.5, 2],
  ['idleAirStuck', 2, 1.5, 0],
  ['mapSensorBad', 2, 1, 0],
  ['throttleSensorBad', 0.5, 0.5, 0],
  ['coolantSensorBad', 1, 0.5, 0],
  ['exhaustBlocked', 0.5, 0.5, 0.5],
  // inside the engine
  ['valveTight', 0.5, 0, 0.5],
  ['crankSealLeak', 0, 1, 0],
  ['reedBroken', 0, 0.5, 0],
]

/** What lies behind "starts, then dies". */
export const DIES_SHARES: ShareList[] = GROUPS.map((group, column) => ({
  ...group,
  of100: Object.fromEntries(
    ROWS.flatMap(([fault, ...of100]) => {
      const share = of100[column] ?? 0
      return share > 0 ? [[fault, share]] : []
    }),
  ),
}))
