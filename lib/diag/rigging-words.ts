/** A rigging's verdict as sentences: what is refused and what to change, with the cautions of a pull (ANSI Z535.6). */
import type { Caution } from '@/lib/model/code-book'
import { LINKS, type LinkKind, type LoadedLink, type RigVerdict } from './rigging'

const NAMES: Readonly<Record<LinkKind, string>> = {
  winch: 'winch',
  line: 'line',
  hook: 'hook',
  block: 'block',
  strap: 'strap',
  shackle: 'shackle',
  anchor: 'anchor',
}

/** Kilonewtons as a rating plate prints them, two decimals. */
const kN = (newtons: number): string => `${(newtons / 1000).toFixed(2)} kN`

/**
 * One sentence for each part that stands in the way, worst first, each with what to change; one sentence of what
 * carries most when nothing does. A part without a rating stands in the way too.
 */
export function rigSentences(rig: RigVerdict): string[] {
  const over = rig.links
    .filter(({ share }) => share !== null && share > 1)
    .sort((a, b) => (b.share ?? 0) - (a.share ?? 0))
  const unrated = rig.links.filter(({ share }) => share === null)
  if (over.length + unrated.length > 0)
    return [
      ...over.map((link) => overloaded(link, rig)),
      ...unrated.map(
        ({ kind, loadNewtons }) =>
          `The ${NAMES[kind]} bears no working load. It would carry ${kN(loadNewtons)}: use one that is marked for that or more.`,
      ),
    ]
  const { weakest } = rig
  return weakest === null ? [] : [holds(weakest, rig)]
}

function overloaded(link: LoadedLink, rig: RigVerdict): string {
  const name = NAMES[link.kind]
  const word = link === rig.weakest ? 'the weakest link' : 'too weak as well'
  const rating = kN(link.ratedNewtons ?? 0)
  return `The ${name} is ${word}: it would carry ${kN(link.loadNewtons)} and is rated ${rating}. ${change(link, rig)}`
}

function change(link: LoadedLink, { partsThatWouldDo }: RigVerdict): string {
  const stronger = `use a ${NAMES[link.kind]} rated ${kN(link.loadNewtons)} or more`
  if (LINKS[link.kind] === 'anchor')
    return `Change it: ${stronger}, or share the load between two anchors.`
  if (partsThatWouldDo === null) return `Change it: ${stronger}, dig out or unload first.`
  return `Change it: lay the line ${LAID[partsThatWouldDo] ?? ''}, or ${stronger}.`
}

const LAID: Readonly<Record<number, string>> = {
  2: 'twice with one block',
  3: 'three times with two blocks',
  4: 'four times with three blocks',
}

const holds = ({ kind, loadNewtons, ratedNewtons }: LoadedLink, rig: RigVerdict): string =>
  `The line carries ${kN(rig.lineNewtons)} and the anchor ${kN(rig.anchorNewtons)}. The ${NAMES[kind]} is nearest to its limit: ${kN(loadNewtons)} of ${kN(ratedNewtons ?? 0)}.`

/** What is said before any pull (the trade's cautions for a loaded line; common practice, no source). */
export const PULL_CAUTIONS: readonly Caution[] = [
  {
    signal: 'WARNING',
    text: 'A line that parts comes back. Nobody within one and a half times its length, in line with it or inside its angle; a damper on the line.',
  },
  {
    signal: 'WARNING',
    text: 'A machine on a slope can run or roll. Nobody below it; chocks, gear and key off before a line goes on or comes off.',
  },
  {
    signal: 'WARNING',
    text: 'No shock load, no knot in the line, full turns on the drum, gloves. Ratings are for a steady pull; the makers’ manuals come first.',
  },
]
