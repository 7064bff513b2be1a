import type { MachineModel } from '@/lib/model/code-book'
import { MOOR_450 } from './demo-moor-450'

/** The models of the demo shop: all invented, and marked so in every figure's source. */
export const DEMO_MODELS: MachineModel[] = [MOOR_450]
