import type { SetupItem } from '@/lib/model/code-book'
import { setups } from './setups'

/** What is opened or waited for in charging and cooling beyond the first set-ups. */
export const CHARGE_SETUPS: SetupItem[] = setups([
  ['statorCoverOff', 'Stator cover off, oil caught', 30, ['sidePanelOff'], true],
  ['thermostatOpen', 'Thermostat housing open', 18, ['engineCold'], true],
  ['cowlOff', 'Cowl and air ducts off', 10, ['sidePanelOff'], true],
])
