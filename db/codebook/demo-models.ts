import type { MachineModel } from '@/lib/model/machine-model'
import { DRIFT_600 } from './demo-drift-600'
import { MOOR_450 } from './demo-moor-450'
import { SKERRY_250 } from './demo-skerry-250'

/** The models of the demo shop: all invented, and marked so in every figure's source. */
export const DEMO_MODELS: MachineModel[] = [MOOR_450, DRIFT_600, SKERRY_250]
