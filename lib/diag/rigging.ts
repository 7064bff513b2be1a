/**
 * Whether a rigging holds: what the line carries with sheaves that lose, what the anchor carries, and which rated
 * part is the weakest (rules R10, [B3] to [B5]). Choice: the winch sits on the stuck machine or on another, the
 * parts of line at the load are counted, and the anchor is reckoned at as many times the line as there are parts,
 * without the losses, which is on the safe side. A block always carries twice its line: one more than the parts ask
 * for only turns the line, and loses as well. A part without a rating is never taken for strong enough.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'

/** Share of its pull that a line loses over one sheave: 10 of 100 (recovery sheet, seen). */
export const SHEAVE_LOSS = 0.1

/**
 * Newtons in the line at the winch: pull / (1 + k + k^2 ...), k = 1 - loss, one term for each part of line. Pull 0 to
 * 1e7 N, whole parts 1 to 6, loss 0 to 0.9 of the line's pull over each sheave.
 */
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
  if (!Number.isInteger(partsOfLine)) return fail({ kind: 'notANumber', field: 'partsOfLine' })
  let gain = 0
  for (let part = 0; part < partsOfLine; part++) gain += (1 - sheaveLoss) ** part
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
/** One of them. */
export type LinkKind = keyof typeof LINKS

/** A part with its working load in newtons; null when it bears no figure. */
export type Link = { kind: LinkKind; ratedNewtons: number | null }

/** A part held against what it carries; `share` is load / rating: above 1 it is overloaded. */
export type LoadedLink = Link & { loadNewtons: number; share: number | null }

/** Whether a rigging is offered, and what every part of it carries, in newtons. */
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

/** `noWinch`: nothing in the rigging pulls. */
export type RigProblem = FigureProblem | { kind: 'noWinch' }

/** More parts of line than this are not laid by hand. */
const MOST_PARTS = 4

/** Judges a rigging for a pull with its margin. Parts of line 1 to 6; ratings 1 to 1e7 N; one winch or more. */
export function judgeRig(rig: {
  withMarginNewtons: number
  partsOfLine: number
  links: readonly Link[]
  sheaveLoss?: number
}): Result<RigVerdict, RigProblem> {
  const { withMarginNewtons, partsOfLine, sheaveLoss = SHEAVE_LOSS } = rig
  const blocks = rig.links.filter(({ kind }) => kind === 'block').length
  const line = windPull({ pull: withMarginNewtons, blocks, loss: sheaveLoss }, partsOfLine)
  if (!line.ok) return line
  const problem = ratingsProblem(rig.links)
  if (problem !== null) return fail(problem)
  if (!rig.links.some(({ kind }) => kind === 'winch')) return fail({ kind: 'noWinch' })
  const anchorNewtons = line.value * Math.max(partsOfLine, blocks > 0 ? 2 : 1)
  const judged = judgeLinks(rig.links, line.value, anchorNewtons)
  const wind = { pull: withMarginNewtons, blocks, loss: sheaveLoss }
  return ok({ ...judged, partsThatWouldDo: partsNeeded(judged.links, wind) })
}

/**
 * Judges what joins two machines in a tow (rule R10): every part carries the tow's force with its margin, 0 to 1e7 N.
 * One part or more; ratings 1 to 1e7 N. There is no second part of line to lay.
 */
export function judgeTow(
  withMarginNewtons: number,
  links: readonly Link[],
): Result<RigVerdict, FigureProblem | { kind: 'noLinks' }> {
  const problem = unfit({ withMarginNewtons: [withMarginNewtons, 0, 1e7] }) ?? ratingsProblem(links)
  if (problem !== null) return fail(problem)
  if (links.length === 0) return fail({ kind: 'noLinks' })
  const judged = judgeLinks(links, withMarginNewtons, withMarginNewtons)
  return ok({ ...judged, partsThatWouldDo: null })
}

const ratingsProblem = (links: readonly Link[]): FigureProblem | null =>
  unfit(
    Object.fromEntries(
      links.map(({ kind, ratedNewtons }, i) => [
        `${kind}.${i + 1}`,
        [ratedNewtons ?? 1, 1, 1e7] as const,
      ]),
    ),
  )

function judgeLinks(
  rated: readonly Link[],
  lineNewtons: number,
  anchorNewtons: number,
): Omit<RigVerdict, 'partsThatWouldDo'> {
  const links = rated.map((link) => loaded(link, lineNewtons, anchorNewtons))
  const weakest = links
    .filter(({ share }) => share !== null)
    .reduce<LoadedLink | null>((worst, one) => (shareOf(one) > shareOf(worst) ? one : worst), null)
  const over = links.some(({ share }) => share !== null && share > 1)
  const unrated = links.some(({ share }) => share === null)
  const verdict = over ? 'refused' : unrated ? 'notRated' : 'offered'
  return { verdict, lineNewtons, anchorNewtons, links, weakest }
}

type Wind = { pull: number; blocks: number; loss: number }

/** The line at the winch, with what is lost over blocks that only turn it: those beyond one for each further part. */
function windPull({ pull, blocks, loss }: Wind, parts: number): Result<number, FigureProblem> {
  const line = linePull(pull, parts, loss)
  if (!line.ok) return line
  return ok(line.value / (1 - loss) ** Math.max(0, blocks - (parts - 1)))
}

const shareOf = (link: LoadedLink | null): number => link?.share ?? Number.NEGATIVE_INFINITY

function loaded(link: Link, lineNewtons: number, anchorNewtons: number): LoadedLink {
  const loadNewtons = LINKS[link.kind] === 'line' ? lineNewtons : anchorNewtons
  const share = link.ratedNewtons === null ? null : loadNewtons / link.ratedNewtons
  return { ...link, loadNewtons, share }
}

/** Fewest parts of line that every rated part on the line can carry; null when none is overloaded there. */
function partsNeeded(links: readonly LoadedLink[], wind: Wind): number | null {
  const onLine = links.filter(({ kind, share }) => LINKS[kind] === 'line' && share !== null)
  if (!onLine.some(({ share }) => (share ?? 0) > 1)) return null
  for (let parts = 2; parts <= MOST_PARTS; parts++) {
    const line = windPull(wind, parts)
    if (line.ok && onLine.every(({ ratedNewtons }) => line.value <= (ratedNewtons ?? 0)))
      return parts
  }
  return null
}
