import type { SetupItem } from '@/lib/model/code-book'
import { setups } from './setups'

/** What this chapter opens beyond the set-ups of the first one. */
export const START_SETUPS: SetupItem[] = setups([
  ['starterReached', 'Starter and its cable in reach', 8, ['sidePanelOff'], false],
  ['batteryCharged', 'Battery charged and rested an hour', 300, [], false],
  ['batteryMinusOff', 'Battery minus cable off', 2, ['seatOff'], true],
])
