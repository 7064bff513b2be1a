/**
 * Whether a rigging holds: what the line carries with sheaves that lose, what the anchor carries, and which rated
 * part is the weakest (rules R10, [B3] to [B5]). Choice: the winch sits on the stuck machine or on another, the
 * parts of line at the load are counted, and the anchor is reckoned at as many times the line as there are parts,
 * without the losses, which is on the safe side. A part without a rating is never taken for strong enough.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'

/** Share of its pull that a line loses over one sheave: 10 of 100 (recovery sheet, seen). */
export const SHEAVE_LOSS = 0.1

/** Newtons in the line at the winch: pull / (1 + k + k^2 ...), k = 1 - loss, one term for each part of line. */
export function linePull(
  pullNewtons: number,
  partsOfLine: number,
  sheaveLoss = SHEAVE_LOSS,
): Result<number, FigureProblem> {
  const problem = unfit({
    pullNewtons: [pullNewtons, 0, 1e7],
    partsOfLine: [partsOfLine, 1, 6],
    sheaveLoss: [sheaveLoss, 0, 0.9],
  })
  if (problem !== null) return fail(problem)
  let gain = 0
  for (let part = 0; part < Math.floor(partsOfLine); part++) gain += (1 - sheaveLoss) ** part
  return ok(pullNewtons / gain)
}

/** What takes part in a pull, and where: on the line, or at the anchor, where the pull of all parts comes together. */
export const LINKS = {
  winch: 'line',
  line: 'line',
  hook: 'line',
  block: 'anchor',
  strap: 'anchor',
  shackle: 'anchor',
  anchor: 'anchor',
} as const
export type LinkKind = keyof typeof LINKS

/** A part with its working load in newtons; null when it bears no figure. */
export type Link = { kind: LinkKind; ratedNewtons: number | null }

/** A part held against what it carries; `share` is load / rating: above 1 it is overloaded. */
export type LoadedLink = Link & { loadNewtons: number; share: number | null }

export type RigVerdict = {
  /** `offered` only when every part is rated and none is overloaded. */
  verdict: 'offered' | 'refused' | 'notRated'
  lineNewtons: number
  anchorNewtons: number
  links: LoadedLink[]
  /** The rated part nearest to its limit or furthest over it; null when none is rated. */
  weakest: LoadedLink | null
  /** Parts of line with which the winch alone would do, when it is overloaded; null when it is not, or none would. */
  partsThatWouldDo: number | null
}

export type RigProblem = FigureProblem | { kind: 'noWinch' }

/** More parts of line than this are not laid by hand. */
const MOST_PARTS = 4

/** Judges a rigging for a pull with its margin. Parts of line 1 to 6; ratings from 1 N; one winch or more. */
export function judgeRig(rig: {
  withMarginNewtons: number
  partsOfLine: number
  links: readonly Link[]
  sheaveLoss?: number
}): Result<RigVerdict, RigProblem> {
  const { withMarginNewtons, partsOfLine, sheaveLoss = SHEAVE_LOSS } = rig
  const line = linePull(withMarginNewtons, partsOfLine, sheaveLoss)
  if (!line.ok) return line
  const problem = unfit(
    Object.fromEntries(
      rig.links.map(({ kind, ratedNewtons }, i) => [
        `${kind}.${i + 1}`,
        [ratedNewtons ?? 1, 1, 1e7] as const,
      ]),
    ),
  )
  if (problem !== null) return fail(problem)
  if (!rig.links.some(({ kind }) => kind === 'winch')) return fail({ kind: 'noWinch' })
  const anchorNewtons = line.value * Math.floor(partsOfLine)
  const links = rig.links.map((link) => loaded(link, line.value, anchorNewtons))
  const weakest = links
    .filter(({ share }) => share !== null)
    .reduce<LoadedLink | null>((worst, one) => (shareOf(one) > shareOf(worst) ? one : worst), null)
  const over = links.some(({ share }) => share !== null && share > 1)
  const unrated = links.some(({ share }) => share === null)
  return ok({
    verdict: over ? 'refused' : unrated ? 'notRated' : 'offered',
    lineNewtons: line.value,
    anchorNewtons,
    links,
    weakest,
    partsThatWouldDo: partsNeeded(links, withMarginNewtons, sheaveLoss),
  })
}

const shareOf = (link: LoadedLink | null): number => link?.share ?? Number.NEGATIVE_INFINITY

function loaded(link: Link, lineNewtons: number, anchorNewtons: number): LoadedLink {
  const loadNewtons = LINKS[link.kind] === 'line' ? lineNewtons : anchorNewtons
  const share = link.ratedNewtons === null ? null : loadNewtons / link.ratedNewtons
  return { ...link, loadNewtons, share }
}

/** Fewest parts of line that every rated part on the line can carry; null when none is overloaded there. */
function partsNeeded(links: readonly LoadedLink[], pull: number, loss: number): number | null {
  const onLine = links.filter(({ kind, share }) => LINKS[kind] === 'line' && share !== null)
  if (!onLine.some(({ share }) => (share ?? 0) > 1)) return null
  for (let parts = 2; parts <= MOST_PARTS; parts++) {
    const line = linePull(pull, parts, loss)
    if (line.ok && onLine.every(({ ratedNewtons }) => line.value <= (ratedNewtons ?? 0)))
      return parts
  }
  return null
}
