import type { MachineModel } from '@/lib/model/machine-model'
import { CRAG_450 } from './demo-crag-450'
import { DRIFT_600 } from './demo-drift-600'
import { FELL_1000 } from './demo-fell-1000'
import { FIRN_900 } from './demo-firn-900'
import { GORSE_230 } from './demo-gorse-230'
import { HEATH_300 } from './demo-heath-300'
import { HOLM_28 } from './demo-holm-28'
import { MOOR_450 } from './demo-moor-450'
import { RIME_440 } from './demo-rime-440'
import { SKERRY_250 } from './demo-skerry-250'

/** The models of the demo shop: all invented, and marked so in every figure's source. */
export const DEMO_MODELS: MachineModel[] = [
  MOOR_450,
  DRIFT_600,
  SKERRY_250,
  FELL_1000,
  RIME_440,
  GORSE_230,
  FIRN_900,
  HEATH_300,
  CRAG_450,
  HOLM_28,
]
