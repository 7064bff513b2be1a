/**
 * The belief of rule R5: independent gated faults, given that at least one is present, under all the evidence
 * of the job log. `why` splits the change of log-odds in the order of the log: each piece gets the change it
 * makes after all earlier ones, so the pieces sum to the whole exactly; the chances do not depend on that order.
 */
import { AppError } from '@/lib/model/result'
import { SOMETHING_ELSE } from './book-index'
import type { Case } from './case'
import { evidenceOf } from './evidence'
import { type About, type Evidence, leftOut } from './evidence-table'
import type { Factor } from './factor'
import { type Summary, summarise } from './joint'
import { type Candidate, candidates } from './priors'

/** One line of "why": `logRatio` is the change of this suspect's log-odds (natural log) by that piece. */
export type Why = {
  entryId: string | null
  about: About
  label: string
  logRatio: number
  saysNothing: boolean
}

/** A suspect with its own chance of being present (0 to 1), never rescaled; `prior` is that before evidence. */
export type Suspect = {
  fault: string
  name: string
  chance: number
  prior: number
  ruledOutBy: string | null
  why: Why[]
}

/** What is believed of a case: suspects from the likeliest down, and what must be said beside them. */
export type Belief = {
  /** By chance, ruled-out ones last; `somethingElse` is always among them. */
  suspects: Suspect[]
  chanceOfTwoOrMore: number
  chanceOnlySomethingElse: number
  notices: ('moreThanOneLikely' | 'maybeNotInList')[]
  /** Entries that do not count, as more evidence than can be summed came before them (joint.ts, evidence.ts). */
  notCounted: string[]
}

/** Above this chance the screen gives notice and the plan looks one action ahead (rule R5). */
export const NOTICE_ABOVE = 0.25
/** A suspect counts as ruled out below 1 of 100, if one piece alone took its odds down to a fifth or less. */
export const RULED_OUT_BELOW = 0.01

/** What was reckoned on the way to a belief: for outlooks and plans. */
export type Reckoning = {
  suspects: readonly Candidate[]
  evidence: readonly Evidence[]
  /** Summaries before any evidence and after each piece. */
  steps: readonly Summary[]
  last: Summary
  /** The factors that speak, by slot. */
  factors: ReadonlyMap<string, Factor>
}

/** The belief of a case: every suspect with its chance, its prior and what moved it. */
export function belief(c: Case): Belief {
  const reckoning = reckon(c)
  const { suspects, last } = reckoning
  const listed = suspects.map((s, i) => suspectOf(reckoning, s, i))
  const only = last.only[suspects.findIndex((s) => s.fault === SOMETHING_ELSE)] ?? 0
  const notices: Belief['notices'] = []
  if (last.twoOrMore > NOTICE_ABOVE) notices.push('moreThanOneLikely')
  if (only > NOTICE_ABOVE) notices.push('maybeNotInList')
  return {
    suspects: listed.sort(byChance),
    chanceOfTwoOrMore: last.twoOrMore,
    chanceOnlySomethingElse: only,
    notices,
    notCounted: reckoning.evidence.filter((e) => e.isLeftOut).map((e) => e.entryId),
  }
}

const TOO_WIDE = 'too much evidence over the same suspects'

/** The evidence of a case taken in one piece after the other; one that cannot be summed with the rest is left out. */
export function reckon(c: Case): Reckoning {
  const suspects = candidates(c)
  const odds = suspects.map((s) => s.odds)
  const factors = new Map<string, Factor>()
  const prior = summarise(odds, [])
  if (prior === null) throw new AppError('tooLarge')
  let last: Summary = prior
  const steps = [last]
  const evidence = evidenceOf(c, suspects).map((piece) => {
    const { slot, factor } = piece
    const after =
      factor === null ? last : summarise(odds, [...new Map(factors).set(slot, factor).values()])
    if (factor !== null && after !== null) factors.set(slot, factor)
    last = after ?? last
    steps.push(last)
    return after === null ? leftOut(piece, TOO_WIDE) : piece
  })
  return { suspects, evidence, steps, last, factors }
}

const isSilent = (piece: Evidence): boolean => piece.factor === null

function suspectOf({ evidence, steps, last }: Reckoning, s: Candidate, at: number): Suspect {
  const chanceAfter = (step: number) => steps[step]?.marginals[at] ?? 0
  const why: Why[] = evidence.map((piece, i) => ({
    entryId: piece.entryId,
    about: piece.about,
    label: piece.label,
    logRatio: isSilent(piece) ? 0 : logOdds(chanceAfter(i + 1)) - logOdds(chanceAfter(i)),
    saysNothing: isSilent(piece),
  }))
  const chance = last.marginals[at] ?? 0
  return {
    fault: s.fault,
    name: s.name,
    chance,
    prior: chanceAfter(0),
    ruledOutBy: ruledOutBy(chance, why),
    why: [shareWhy(s), ...why],
  }
}

/** Where the suspect starts from; its log-odds are the start of the sum, so it adds nothing to the change. */
const shareWhy = (s: Candidate): Why => ({
  entryId: null,
  about: 'share',
  label: `Of 100 such calls: ${Number(s.of100.toFixed(1))}`,
  logRatio: 0,
  saysNothing: false,
})

/** Log-odds kept within +-34 so that certainty stays a number. */
export function logOdds(p: number): number {
  const held = Math.min(1 - 1e-15, Math.max(1e-15, p))
  return Math.log(held / (1 - held))
}

function ruledOutBy(chance: number, why: readonly Why[]): string | null {
  if (chance >= RULED_OUT_BELOW) return null
  let worst: Why | null = null
  for (const w of why) if (w.logRatio < (worst?.logRatio ?? -Math.log(5))) worst = w
  return worst?.entryId ?? null
}

function byChance(a: Suspect, b: Suspect): number {
  const out = Number(a.ruledOutBy !== null) - Number(b.ruledOutBy !== null)
  return out || b.chance - a.chance || (a.fault < b.fault ? -1 : 1)
}
