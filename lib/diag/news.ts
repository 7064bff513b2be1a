/**
 * What counts as news: below these sizes a figure moves, but nothing a person can use. Apart from the belief
 * and the outlook, so that a screen can ask without the engine.
 */

/** A change of a suspect's chance by less than this much (3 of 100) is no news (rule F4; guess). */
export const SAYS_NOTHING_BELOW = 0.03

/** A natural-log factor on the odds smaller than this moves an even chance by less than 2 of 1,000 (guess). */
const WEIGHS_NOTHING_BELOW = 0.005

/** True when chances (0 to 1) lie nearer together than news does; also for none or one. */
export const tellsNothing = (chances: readonly number[]): boolean =>
  chances.length === 0 || Math.max(...chances) - Math.min(...chances) < SAYS_NOTHING_BELOW

/** True when a piece of evidence leaves the odds of a suspect as they are, by its own word or by its size. */
export const weighsNothing = (why: { saysNothing: boolean; logRatio: number }): boolean =>
  why.saysNothing || Math.abs(why.logRatio) < WEIGHS_NOTHING_BELOW
