import type { SymptomItem } from '@/lib/model/code-book'
import { OWN_WORDS } from './sources'

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
    conditions: [
      { id: 'afterSeconds', name: 'After one to three seconds', tells: null },
      { id: 'afterMinutes', name: 'After some minutes', tells: null },
      { id: 'whenCold', name: 'When cold', tells: null },
      { id: 'whenHot', name: 'When hot', tells: null },
      { id: 'whenWet', name: 'When wet', tells: null },
      { id: 'whenLeaning', name: 'When leaning or on a slope', tells: null },
      { id: 'always', name: 'Every time', tells: null },
      { id: 'nowAndThen', name: 'Now and then', tells: null },
    ],
    opens: 'suspects',
    cautions: [],
    firstLook: [],
    twoWrongOf100: 5,
    source: `${OWN_WORDS}; two things wrong in 5 of 100 where nobody knows (common practice, no source)`,
  },
]
