import type { CodeTells } from '@/lib/model/code-table'
import { AIR_STORIES } from './code-stories-air'
import { ENGINE_STORIES } from './code-stories-engine'
import type { Story } from './code-story'

/**
 * What codes tell that name a condition: a misfire, a mixture, a temperature. Figures are guesses from common
 * practice, no source: of 100 machines that log codes and have this fault and no other, how many set such a code.
 * Most of them stay low, as small machines watch few conditions. Faults of the circuit a code names keep the figure
 * of its failure kind unless they stand here.
 */
export const STORIES: readonly Story[] = [...AIR_STORIES, ...ENGINE_STORIES]

/** The story of a P-code; null where it tells none. */
export function pcodeTells(code: string): CodeTells | null {
  const story = STORIES.find(({ pcodes }) => pcodes.includes(code))
  return story === undefined ? null : { ...tellsOf(story), fmis: null }
}

/** The story of an SPN with the kinds it holds for; null where it tells none. */
export function spnTells(spn: number): CodeTells | null {
  const story = STORIES.find(({ spns }) => spns.includes(spn))
  return story === undefined ? null : { ...tellsOf(story), fmis: story.fmis && [...story.fmis] }
}

const tellsOf = ({ id, of100, otherwise }: Story) => ({ id, of100: { ...of100 }, otherwise })
