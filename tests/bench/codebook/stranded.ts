import type { Features } from '@/lib/model/features'

/** Stands in `faults` where the truth is in no list of the code book. */
export const SOMETHING_ELSE_TRUE = 'somethingElse'

export const UNSEEN = 'common practice, no source; case written before the tables were seen'

/** One way to look, listen, try or measure, and what a competent mechanic would find that way. */
export type Look = { look: string; seen: string }

/** A stranded machine whose fault is known, written down without regard to any figure of the code book. */
export type Stranded = {
  name: string
  features: Features
  symptom: string
  /** What the rider says, in plain words. */
  conditions: readonly string[]
  faults: readonly string[]
  /** The state of the machine, from which the outcome of any check can be told. */
  truth: readonly Look[]
  source: string
}

/** The looks as a list, from what was looked at to what was seen. */
export const looks = (seen: Record<string, string>): Look[] =>
  Object.entries(seen).map(([look, what]) => ({ look, seen: what }))

/** How the checks of the book end on one of these machines, told by someone who saw outcomes and no figure. */
export type Answered = {
  /** Conditions of the complaint that the rider's words name. */
  conditions: readonly string[]
  /** By check; a check that is not named ends as its first outcome says: nothing wrong to be seen. */
  ends: Readonly<Record<string, string>>
  /** Swaps after which the machine was well: 1 a contact or plug had cured it, 2 the part was it. */
  swaps: Readonly<Record<string, 1 | 2>>
  /** Checks that cannot be done on this machine as it stands. */
  cannot: readonly string[]
  /** With two faults: the ends once only the one named is mended. */
  after?: Readonly<Record<string, Readonly<Record<string, string>>>>
}
