import type { SetupItem } from '@/lib/model/code-book'
import { type SetupRow, setups } from './setups'

/** Minutes are for bare hands in daylight; `true` marks what must be closed again before a test run. */
const ROWS: readonly SetupRow[] = [
  ['beltCoverOff', 'Belt cover off', 6, [], true],
  ['beltOff', 'Drive belt off', 5, ['beltCoverOff'], true],
  ['endRaised', 'One end raised on a stand', 6, [], true],
  ['wheelOff', 'Wheel off', 7, ['endRaised'], true],
  ['tubeOut', 'Inner tube out', 15, ['wheelOff'], true],
  ['caliperOff', 'Brake caliper off', 8, [], true],
  ['gearOilPlugOut', 'Gear oil plug out', 6, [], true],
  ['shiftRodOff', 'Shift rod unhooked', 4, [], true],
  ['skidOut', 'Rear suspension out of the tunnel', 45, ['endRaised'], true],
  ['chainCaseOpen', 'Chain case open', 25, [], true],
]

/** What has to be opened or raised before a check or a repair of the drive, the brakes or the track. */
export const DRIVE_SETUPS: SetupItem[] = setups(ROWS)
