import type { PcodeItem } from '@/lib/model/code-book'
import { pcodeTells } from './code-tells'
import { AIR_PCODES } from './pcodes-air'
import { DRIVE_PCODES } from './pcodes-drive'
import { FUEL_PCODES } from './pcodes-fuel'
import { NETWORK_PCODES } from './pcodes-network'
import { SECOND_PCODES } from './pcodes-second'
import { SPEED_PCODES } from './pcodes-speed'

const ROWS = [
  ...AIR_PCODES,
  ...FUEL_PCODES,
  ...SPEED_PCODES,
  ...DRIVE_PCODES,
  ...SECOND_PCODES,
  ...NETWORK_PCODES,
]

/**
 * Every standard code the book can name, one item per code, id `pcode` + code. A maker's own codes (P1, P30 to P33,
 * and C, B, U with 1 or 2) are not in the table: their form alone says whose they are.
 */
export const PCODES: PcodeItem[] = ROWS.map(
  ([code, name, circuit, failure, group, source, differs = false]) => ({
    kind: 'pcode',
    id: `pcode${code}`,
    code,
    name,
    circuit,
    failure,
    tells: pcodeTells(code),
    group,
    makersDiffer: differs,
    source,
  }),
)
