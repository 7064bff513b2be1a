import type { SymptomItem } from '@/lib/model/code-book'
import { VAPOUR } from './cautions'
import { OWN_WORDS } from './sources'
import { DIES_WHEN } from './symptoms-dies-when'

/** The complaint of the first chapter. `twoWrongOf100` is m of rule R5: practice where nobody knows. */
export const DIES_SYMPTOMS: SymptomItem[] = [
  {
    kind: 'symptom',
    id: 'startsThenDies',
    name: 'Starts, then dies',
    gate: {},
    riderWords: [
      'starts then dies',
      'starts and stops',
      'starts and dies right away',
      'fires up and cuts out',
      'runs a second and quits',
      'runs two seconds and stops',
      'will not stay running',
      'will not keep running',
      'cuts out',
      'cut out and now only runs for a moment',
      'stalls straight after starting',
      'stalls',
      'conks out',
      'dies',
      'keeps dying',
      'catches and dies',
      'dies when I let go of the starter',
    ],
    conditions: DIES_WHEN,
    opens: 'suspects',
    engine: 'runs',
    cautions: [
      VAPOUR,
      {
        signal: 'WARNING',
        text: 'It may start and pull away: neutral proved by pushing, brake on, nobody in front.',
      },
    ],
    firstLook: [
      'fuelLevelTap',
      'pumpPrimeListen',
      'storedCodes',
      'keyWiggle',
      'stopSwitchLook',
      'chokePosition',
      'tailpipeColour',
    ],
    twoWrongOf100: 5,
    source: `${OWN_WORDS}; two things wrong in 5 of 100 where nobody knows and figures of "when" (common practice, no source)`,
  },
]
