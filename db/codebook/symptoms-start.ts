import type { SymptomItem } from '@/lib/model/code-book'
import { ELECTRICAL_DEAD } from './symptoms-start-dead'
import { NO_CRANK } from './symptoms-start-no-crank'

/** The complaints of this chapter. */
export const START_SYMPTOMS: SymptomItem[] = [NO_CRANK, ELECTRICAL_DEAD]
