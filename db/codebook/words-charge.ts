import type { WordItem } from '@/lib/model/code-book'
import { type WordRow, words } from './words'

const SYSTEMS: readonly WordRow[] = [
  ['chargeSystem', 'Charging'],
  ['coolingSystem', 'Cooling'],
]

const CIRCUITS: readonly WordRow[] = [
  ['chargingSystem', 'Stator, regulator and charge wire'],
  ['fanControl', 'Cooling fan and its control'],
  ['coolantLevel', 'Coolant level'],
]

const PARTS: readonly WordRow[] = [
  ['statorUnit', 'Stator with cover gasket'],
  ['regulatorUnit', 'Regulator/rectifier'],
  ['coolantHoseKit', 'Coolant hose, clamps and coolant'],
  ['fanUnit', 'Cooling fan with motor'],
  ['thermostatUnit', 'Thermostat with seal'],
  ['coolantPumpKit', 'Coolant pump wheel, shaft and seals'],
  ['headGasketSet', 'Head gasket set'],
  ['coolantCap', 'Pressure cap'],
  ['fanBelt', 'Fan belt'],
]

const TOOLS: readonly WordRow[] = [
  ['coolingPump', 'Hand pump with gauge for the cooling system'],
  ['fusedLeads', 'Two leads with a 15 A fuse'],
  ['snowShovel', 'Snow shovel'],
]

/** Words this chapter needs beyond those of the chapters before it. */
export const CHARGE_WORDS: WordItem[] = [
  ...words('system', SYSTEMS),
  ...words('circuit', CIRCUITS),
  ...words('part', PARTS),
  ...words('tool', TOOLS),
]
