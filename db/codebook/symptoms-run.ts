import type { SymptomItem } from '@/lib/model/code-book'
import { BACKFIRES } from './symptoms-run-backfires'
import { LIMP_MODE } from './symptoms-run-limp'
import { CRANKS_NO_START } from './symptoms-run-no-start'
import { RUNS_ROUGH } from './symptoms-run-rough'

/** The complaints of this chapter. */
export const RUN_SYMPTOMS: SymptomItem[] = [CRANKS_NO_START, RUNS_ROUGH, LIMP_MODE, BACKFIRES]
