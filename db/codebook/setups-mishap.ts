import type { SetupItem } from '@/lib/model/code-book'
import { type SetupRow, setups } from './setups'

const ROWS: readonly SetupRow[] = [
  ['throttleHousingOpen', 'Throttle housing open', 4, [], true],
  ['recoilOff', 'Recoil starter off', 8, ['sidePanelOff'], true],
  ['kickSideOpen', 'Kick side cover off', 25, ['engineCool'], true],
  ['skidPlateOff', 'Skid plate off', 10, [], false],
  ['oilGaugeIn', 'Oil gauge in the switch port', 9, ['sidePanelOff'], true],
  ['exhaustPipeOff', 'Exhaust pipe off', 14, ['engineCool'], true],
  ['engineCool', 'Engine cool enough to touch', 15, [], false],
]

/** What this chapter opens or waits for, beyond the first set-ups. */
export const MISHAP_SETUPS: SetupItem[] = setups(ROWS)
