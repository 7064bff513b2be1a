import type { WordItem } from '@/lib/model/code-book'
import { type WordRow, words } from './words'

const SYSTEMS: readonly WordRow[] = [['startSystem', 'Starter and interlocks']]

const CIRCUITS: readonly WordRow[] = [
  ['starterCircuit', 'Starter, its relay and button'],
  ['interlockSwitch', 'Brake, clutch, neutral or seat switch'],
]

const PARTS: readonly WordRow[] = [
  ['interlockUnit', 'Brake, clutch, neutral or seat switch'],
  ['starterRelayUnit', 'Starter relay'],
  ['startButtonUnit', 'Start button'],
  ['starterMotorUnit', 'Starter motor'],
  ['starterClutchSet', 'Starter clutch or drive gear'],
]

const TOOLS: readonly WordRow[] = [
  ['jumpCables', 'Jump cables'],
  ['batteryLoader', 'Battery load tester'],
  ['heavyLead', 'Short battery cable with clamps'],
  ['milliMeter', 'Pocket meter with a 10 A and a mA range'],
]

/** Words of starter and power the earlier chapters have not. */
export const START_WORDS: WordItem[] = [
  ...words('system', SYSTEMS),
  ...words('circuit', CIRCUITS),
  ...words('part', PARTS),
  ...words('tool', TOOLS),
]
