// Twelve stranded machines written before the tables of the code book were seen: an outside measure of the book.
// They are one person's practice, not records of jobs: they show where the book leads astray, not how often.
import { STARTING_CASES } from './cases-1'
import { RUNNING_CASES } from './cases-2'
import { POWER_CASES } from './cases-3'
import { MISHAP_CASES } from './cases-4'
import type { Stranded } from './stranded'

export const STRANDED_CASES: readonly Stranded[] = [
  ...STARTING_CASES,
  ...RUNNING_CASES,
  ...POWER_CASES,
  ...MISHAP_CASES,
]
