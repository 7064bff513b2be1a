import type { SetupItem } from '@/lib/model/code-book'
import { PRACTICE } from './sources'

export type SetupRow = readonly [
  id: string,
  name: string,
  minutes: number,
  requires: readonly string[],
  closedByTest: boolean,
]

/** Minutes are for bare hands in daylight; `true` marks what must be closed again before a test run. */
const ROWS: readonly SetupRow[] = [
  ['seatOff', 'Seat off', 1, [], false],
  ['sidePanelOff', 'Side panel off', 2, [], false],
  ['frontCoverOff', 'Front cover off', 3, [], false],
  ['tankCoverOff', 'Tank cover off', 4, ['seatOff'], false],
  ['plugOut', 'Spark plug out', 4, [], true],
  ['coilPlugOff', 'Coil connector off', 1, ['sidePanelOff'], true],
  ['modulePlugOff', 'Control module connector off', 2, ['seatOff'], true],
  ['railRelieved', 'Fuel pressure let off', 3, ['tankCoverOff'], true],
  ['gaugeInLine', 'Pressure gauge in the fuel line', 4, ['railRelieved'], true],
  ['airboxOpen', 'Air box open', 2, ['seatOff'], true],
  ['crankPlugOff', 'Crank sensor connector off', 2, ['sidePanelOff'], true],
  ['valveCoverOff', 'Valve cover off', 15, ['tankCoverOff', 'engineCold'], true],
  ['engineCold', 'Engine cold', 45, [], false],
  ['carburettorOff', 'Carburettor off', 15, ['tankCoverOff'], true],
]

/** What has to be opened or waited for before a check or a repair, paid once while it stays open. */
export const SETUPS: SetupItem[] = setups(ROWS)

/** Set-ups from their rows. */
export function setups(rows: readonly SetupRow[]): SetupItem[] {
  return rows.map(([id, name, minutes, requires, closedByTest]) => ({
    kind: 'setup',
    id,
    name,
    minutes,
    requires: [...requires],
    closedByTest,
    source: PRACTICE,
  }))
}
