import type { ShareList } from './chapter'
import { columns, type ShareRow } from './shares-run'

const GROUPS: readonly Omit<ShareList, 'of100'>[] = [
  {
    symptom: 'limpMode',
    gate: { fuelling: ['injection'], electronicThrottle: ['yes'] },
    somethingElse: 8,
  },
  {
    symptom: 'limpMode',
    gate: { fuelling: ['injection'], electronicThrottle: ['no'], strokes: ['four'] },
    somethingElse: 9,
  },
  {
    symptom: 'limpMode',
    gate: { fuelling: ['injection'], electronicThrottle: ['no'], strokes: ['two'] },
    somethingElse: 9,
  },
]

/** Columns: throttle by wire, throttle by cable four-stroke, throttle by cable two-stroke. */
const ROWS: readonly ShareRow[] = [
  ['gripSensorsDisagree', 17, 0, 0],
  ['throttleActuatorBad', 11, 0, 0],
  ['throttleSensorBad', 4, 14, 14],
  ['sensorSupplyDown', 8, 7, 7],
  ['mapSensorBad', 5, 9, 9],
  ['coolantSensorBad', 3, 5, 5],
  ['airTempSensorBad', 3, 5, 7],
  ['oxygenSensorBad', 2, 4, 0],
  ['injectorCircuit', 4, 7, 8],
  ['ignitionCoilPart', 2, 3, 4],
  ['ignitionCoilWiring', 3, 4, 5],
  ['crankSensorWiring', 2, 3, 4],
  ['camSensorBad', 3, 4, 0],
  ['speedSensorBad', 6, 6, 4],
  ['networkFault', 5, 3, 3],
  ['controlModuleFault', 2, 2, 2],
  ['groundPoor', 3, 3, 3],
  ['batteryLow', 4, 4, 3],
  ['fuelPumpWeak', 2, 4, 4],
  ['powerValveStuck', 0, 0, 9],
  ['fourWheelFault', 2, 3, 0],
  ['gearPositionBad', 1, 1, 0],
]

/** What lies behind "stuck in limp mode". */
export const LIMP_SHARES: ShareList[] = columns(GROUPS, ROWS)
