// Twelve stranded machines written before the tables of the code book were seen: an outside measure of the book.
// They are one person's practice, not records of jobs: they show where the book leads astray, not how often. What
// was found in giving the answers has been mended in the book since, so that it is no longer blind to them.
import { CLICKS_ONLY } from './answers/clicks-only'
import { DEAD_BARS_TURNED } from './answers/dead-bars-turned'
import { DROWNED } from './answers/drowned'
import { HELD_BACK } from './answers/held-back'
import { NO_CHARGE } from './answers/no-charge'
import { NO_SIGNAL } from './answers/no-signal'
import { OVERHEATS_TWICE } from './answers/overheats-twice'
import { RATTLES } from './answers/rattles'
import { REVS_NO_DRIVE } from './answers/revs-no-drive'
import { RUNS_LEAN } from './answers/runs-lean'
import { SNOWMOBILE_STARVES } from './answers/snowmobile-starves'
import { SOFT_BRAKE } from './answers/soft-brake'
import { STARTING_CASES } from './cases-1'
import { RUNNING_CASES } from './cases-2'
import { POWER_CASES } from './cases-3'
import { MISHAP_CASES } from './cases-4'
import type { Answered, Stranded } from './stranded'

const STRANDED_CASES: readonly Stranded[] = [
  ...STARTING_CASES,
  ...RUNNING_CASES,
  ...POWER_CASES,
  ...MISHAP_CASES,
]

/** In the order of the cases. */
const ANSWERS: readonly Answered[] = [
  SNOWMOBILE_STARVES,
  NO_SIGNAL,
  CLICKS_ONLY,
  RUNS_LEAN,
  OVERHEATS_TWICE,
  HELD_BACK,
  NO_CHARGE,
  DEAD_BARS_TURNED,
  REVS_NO_DRIVE,
  SOFT_BRAKE,
  DROWNED,
  RATTLES,
]

/** Each machine with how the checks end on it. */
export const ANSWERED_CASES = STRANDED_CASES.map((stranded, i) => {
  const answered = ANSWERS[i]
  if (answered === undefined) throw new Error(`${stranded.name} has no answers`)
  return { stranded, answered }
})
