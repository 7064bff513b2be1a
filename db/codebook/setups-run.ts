import type { SetupItem } from '@/lib/model/code-book'
import { setups } from './setups'

/** What the chapter opens beyond the set-ups of the first one. */
export const RUN_SETUPS: SetupItem[] = setups([
  ['flywheelCoverOff', 'Flywheel cover off', 18, ['sidePanelOff'], true],
  ['exhaustValveOpen', 'Exhaust valve cover off', 12, ['sidePanelOff'], true],
  ['injectorOut', 'Injector out, still on its fuel line', 10, ['railRelieved'], true],
  ['drivenEndUp', 'One driven wheel or the track off the ground', 4, [], true],
])
