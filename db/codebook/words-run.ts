import type { WordItem } from '@/lib/model/code-book'
import { type WordRow, words } from './words'

const SYSTEMS: readonly WordRow[] = [
  ['signalSystem', 'Sensors, modules and network'],
  ['wireThrottleSystem', 'Electronic throttle'],
]

const CIRCUITS: readonly WordRow[] = [
  ['camSensor', 'Cam position sensor'],
  ['vehicleSpeed', 'Vehicle speed sensor'],
  ['gripSensor', 'Throttle grip or pedal sensor'],
  ['throttleActuator', 'Throttle actuator'],
  ['oxygenSensor', 'Oxygen sensor signal'],
  ['oxygenHeater', 'Oxygen sensor heater'],
  ['airTempSensor', 'Intake air temperature sensor'],
  ['network', 'Network between the modules'],
  ['security', 'Security, key recognition'],
  ['exhaustValve', 'Exhaust valve and its servo'],
]

const PARTS: readonly WordRow[] = [
  ['camSensorUnit', 'Cam position sensor'],
  ['codedKey', 'Coded key or tether'],
  ['gripUnit', 'Throttle grip or lever with sensor'],
  ['throttleBodyUnit', 'Throttle body with actuator'],
  ['speedSensorUnit', 'Vehicle speed sensor'],
  ['exhaustGasketSet', 'Exhaust gaskets and springs'],
  ['exhaustValveKit', 'Exhaust valve parts'],
  ['airTempUnit', 'Intake air temperature sensor'],
  ['oxygenUnit', 'Oxygen sensor'],
  ['shaftKey', 'Flywheel key'],
  ['topEndKit', 'Piston, rings and top gaskets'],
  ['timingChainSet', 'Cam chain or belt with tensioner'],
]

const TOOLS: readonly WordRow[] = [
  ['compressionGauge', 'Compression gauge'],
  ['leakTester', 'Cylinder leak tester with air'],
  ['strobeLight', 'Timing light'],
  ['oilCan', 'Oil can'],
]

/** Words the chapter needs beyond those of the first one. */
export const RUN_WORDS: WordItem[] = [
  ...words('system', SYSTEMS),
  ...words('circuit', CIRCUITS),
  ...words('part', PARTS),
  ...words('tool', TOOLS),
]
