import type { WordItem } from '@/lib/model/code-book'
import { OWN_WORDS } from './sources'

export type WordRow = readonly [id: string, name: string]

const SYSTEMS: readonly WordRow[] = [
  ['fuelSystem', 'Fuel'],
  ['ignitionSystem', 'Ignition'],
  ['timingSystem', 'Crank signal and timing'],
  ['safetySystem', 'Stop and safety circuits'],
  ['powerSystem', 'Battery and power'],
  ['airSystem', 'Air and exhaust'],
  ['engineInside', 'Engine inside'],
]

const CIRCUITS: readonly WordRow[] = [
  ['ignitionCoil1', 'Ignition coil 1, primary side'],
  ['ignitionCoil2', 'Ignition coil 2, primary side'],
  ['ignitionCoil3', 'Ignition coil 3, primary side'],
  ['ignitionCoil4', 'Ignition coil 4, primary side'],
  ['injector1', 'Injector, cylinder 1'],
  ['injector2', 'Injector, cylinder 2'],
  ['injector3', 'Injector, cylinder 3'],
  ['injector4', 'Injector, cylinder 4'],
  ['fuelPump', 'Fuel pump drive'],
  ['fuelPressure', 'Fuel pressure'],
  ['crankSensor', 'Crank position sensor'],
  ['throttleSensor', 'Throttle position sensor'],
  ['mapSensor', 'Intake pressure sensor'],
  ['coolantTempSensor', 'Coolant temperature sensor'],
  ['idleAir', 'Idle air valve'],
  ['systemVoltage', 'Battery and module supply volts'],
  ['sensorSupply', '5 V sensor supply'],
  ['mainRelay', 'Main power relay'],
  ['stopCircuit', 'Engine stop circuit'],
  ['tipOverSensor', 'Tip-over sensor'],
  ['controlModule', 'Engine control module'],
]

const PARTS: readonly WordRow[] = [
  ['ignitionCoil', 'Ignition coil'],
  ['sparkPlug', 'Spark plug'],
  ['plugCap', 'Plug cap and lead'],
  ['relay', 'Relay, small changeover type'],
  ['fuseSet', 'Fuse set'],
  ['fuelFilter', 'Fuel filter'],
  ['fuelPumpUnit', 'Fuel pump'],
  ['fuelRegulator', 'Fuel pressure regulator'],
  ['fuelHose', 'Fuel hose with clamps'],
  ['injector', 'Injector'],
  ['crankSensorUnit', 'Crank position sensor'],
  ['tipOverUnit', 'Tip-over sensor'],
  ['stopSwitch', 'Stop switch'],
  ['battery12V', '12 V battery'],
  ['batteryTerminal', 'Battery terminal'],
  ['groundStrap', 'Ground strap'],
  ['connectorKit', 'Connector pins and seals'],
  ['wireKit', 'Wire, splices and tape'],
  ['engineModule', 'Engine control module'],
  ['airFilter', 'Air filter'],
  ['intakeBoot', 'Intake boot and clamps'],
  ['idleAirValve', 'Idle air valve'],
  ['mapSensorUnit', 'Intake pressure sensor'],
  ['throttleSensorUnit', 'Throttle position sensor'],
  ['coolantSensorUnit', 'Coolant temperature sensor'],
  ['carburettorKit', 'Carburettor jets and gaskets'],
  ['pulsePump', 'Pulse pump and pulse hose'],
  ['crankSeal', 'Crank seal'],
  ['reedSet', 'Reed valves'],
  ['freshFuel', 'Fresh fuel, one litre'],
]

const TOOLS: readonly WordRow[] = [
  ['multimeter', 'Pocket meter'],
  ['backProbes', 'Thin back probes'],
  ['loadBulb', '21 W bulb on two leads'],
  ['peakAdapter', 'Peak volts adapter'],
  ['plugSocket', 'Plug socket'],
  ['socketSet', 'Sockets and ratchet'],
  ['screwdriver', 'Screwdriver'],
  ['pliers', 'Pliers'],
  ['lamp', 'Lamp'],
  ['jar', 'Clear jar with lid'],
  ['sparkTester', 'Spark gap tester'],
  ['fuelGauge', 'Fuel pressure gauge with hose'],
  ['fuelCan', 'Closed metal fuel can'],
  ['injectorLight', 'Injector test light'],
  ['feelerGauge', 'Feeler gauges'],
  ['thermometer', 'Contact thermometer'],
  ['waterSpray', 'Water spray bottle'],
  ['caseTester', 'Hand pump and plugs for a crankcase test'],
]

/** Words of one kind from their rows. */
export const words = (kind: WordItem['kind'], rows: readonly WordRow[]): WordItem[] =>
  rows.map(([id, name]) => ({ kind, id, name, source: OWN_WORDS }))

/** Systems, circuits, parts and tools by the names the trade uses. Ids are unique over all kinds. */
export const WORDS: WordItem[] = [
  ...words('system', SYSTEMS),
  ...words('circuit', CIRCUITS),
  ...words('part', PARTS),
  ...words('tool', TOOLS),
]
