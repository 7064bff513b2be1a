// One job from the complaint to its end, on a machine that answers: what was done, what it took, what was found.
import { belief } from '@/lib/diag/belief'
import { type BookIndex, SOMETHING_ELSE } from '@/lib/diag/book-index'
import { buildCase, type Case } from '@/lib/diag/case'
import { knownSymptoms, looksLeft } from '@/lib/diag/first-look'
import { nextStep } from '@/lib/diag/plan'
import type { Means } from '@/lib/diag/plan-means'
import { TEST_RUN_MINUTES } from '@/lib/diag/plan-model'
import type { Features } from '@/lib/model/features'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { afterRepair, checksFor, endOfCheck, endOfSwap, type Machine } from './machine'
import { shuffled } from './random'

/** All tools and parts at hand, one mechanic, daylight, no time to leave by; money as in the demo shop, invented. */
export const MEANS: Means = {
  bag: null,
  roles: ['mechanic'],
  minutesToLeaveBy: null,
  shop: { perMinuteMinor: 160, towMinor: 30_000, recoveryMinor: 30_000 },
  dark: false,
  people: 1,
}

export type Act = { type: 'check' | 'swap' | 'repair'; id: string } | { type: 'stop'; id: string }
/** What to do next, from what is known; `failed`: faults whose repair did not help. */
export type Policy = (c: Case, failed: readonly string[]) => Act

export type Drive = {
  /** The suspect on top when the last repair or the way out was chosen was truly wrong. */
  rightAtEnd: boolean
  fixed: boolean
  checks: number
  minutes: number
  /** Minutes at the shop's rate, parts not counted, with what the way out costs. */
  costMinor: number
  /** exp of the entropy of the suspects once complaint, conditions and first look are in. */
  openAfterLook: number
  acts: string[]
}

export type Answers = {
  check: (machine: Machine, checkId: string) => LogBody
  swap: (machine: Machine, swapId: string) => LogBody[]
  repair: (machine: Machine, fault: string) => Machine
}

/** Answers drawn from a book's own tables. */
export const drawnAnswers = (truth: BookIndex, random: () => number): Answers => ({
  check: (machine, checkId) => endOfCheck(truth, { machine, checkId }, random),
  swap: (machine, swapId) => endOfSwap(truth, { machine, swapId }, random),
  repair: (machine, fault) => afterRepair(truth, { machine, fault }, random),
})

const MOST_ACTS = 60
const id = (n: number) => `01980000-0000-7000-8000-${String(n).padStart(12, '0')}`

type Given = {
  index: BookIndex
  machine: Machine
  /** What is known of the machine when the job begins. */
  told: Features
  policy: Policy
  answers: Answers
}

/** Drives a policy from the complaint to the end of the job. */
export function drive(given: Given): Drive {
  const job = new Job(given)
  job.look()
  for (let n = 0; n < MOST_ACTS && job.goesOn; n++) job.do()
  return job.told()
}

class Job {
  readonly #given: Given
  readonly #bodies: LogBody[]
  readonly #opened = new Set<string>()
  readonly #failed: string[] = []
  readonly #done: Drive = {
    rightAtEnd: false,
    fixed: false,
    checks: 0,
    minutes: 0,
    costMinor: 0,
    openAfterLook: 0,
    acts: [],
  }
  #machine: Machine
  goesOn = true

  constructor(given: Given) {
    const { symptom, conditions } = given.machine
    this.#given = given
    this.#machine = given.machine
    this.#bodies = [{ kind: 'symptom', symptom, conditions: [...conditions], words: null }]
  }

  /** The looks that every job of this complaint begins with. */
  look(): void {
    const { index, told, machine } = this.#given
    const symptoms = knownSymptoms(index, [machine.symptom])
    for (const { id } of looksLeft(index, { symptoms, features: told, entries: [] }))
      this.#check(id)
    this.#done.openAfterLook = effective(belief(this.#case()).suspects.map((s) => s.chance))
  }

  do(): void {
    const c = this.#case()
    const act = this.#given.policy(c, this.#failed)
    this.#done.acts.push(`${act.type} ${act.id}`)
    if (act.type === 'repair' || act.type === 'stop') this.#noteTop(c)
    if (act.type === 'check') this.#check(act.id)
    else if (act.type === 'swap') this.#swap(act.id)
    else if (act.type === 'repair') this.#repair(act.id)
    else this.#stop(act.id)
  }

  told(): Drive {
    const worked = this.#done.minutes * MEANS.shop.perMinuteMinor
    return { ...this.#done, costMinor: this.#done.costMinor + worked }
  }

  #check(checkId: string): void {
    const { index, answers } = this.#given
    const item = index.checks.get(checkId)
    this.#done.checks += 1
    this.#takes(item?.minutes ?? 0, item?.setups ?? [])
    this.#bodies.push(answers.check(this.#machine, checkId))
  }

  #swap(swapId: string): void {
    const { index, answers } = this.#given
    const swap = index.swaps.get(swapId)
    this.#done.checks += 1
    this.#takes(swap?.minutes ?? 0, swap?.setups ?? [])
    this.#bodies.push(...answers.swap(this.#machine, swapId))
  }

  #repair(fault: string): void {
    const { index, answers } = this.#given
    const repair = index.faults.get(fault)?.repair
    this.#takes((repair?.minutes ?? 0) + TEST_RUN_MINUTES, repair?.setups ?? [])
    this.#done.costMinor += repair?.costMinor ?? 0
    const was = this.#machine.faults.length
    this.#machine = answers.repair(this.#machine, fault)
    this.#done.fixed = was > 0 && this.#machine.faults.length === 0
    this.#bodies.push(fix(fault), proof(this.#done.fixed ? 0 : 1))
    this.#failed.push(fault)
    this.goesOn = !this.#done.fixed
  }

  #stop(way: string): void {
    const { towMinor, recoveryMinor } = MEANS.shop
    this.#done.costMinor += way === 'returnLater' ? recoveryMinor : towMinor
    this.goesOn = false
  }

  /** Whether the suspect on top is truly wrong: the last word is that of the end. */
  #noteTop(c: Case): void {
    const wrong = this.#given.machine.faults
    const top = belief(c).suspects[0]?.fault ?? SOMETHING_ELSE
    this.#done.rightAtEnd = wrong.length === 0 ? top === SOMETHING_ELSE : wrong.includes(top)
  }

  #takes(minutes: number, setups: readonly string[]): void {
    const { index } = this.#given
    const news = withNeeds(index, setups).filter((setup) => !this.#opened.has(setup))
    for (const setup of new Set(news)) {
      this.#opened.add(setup)
      this.#done.minutes += index.setups.get(setup)?.minutes ?? 0
    }
    this.#done.minutes += minutes
  }

  #case(): Case {
    const { index, told, machine } = this.#given
    return caseOf({ index, told, symptom: machine.symptom, bodies: this.#bodies })
  }
}

const fix = (fault: string): LogBody => ({ kind: 'fix', fault, words: 'Done.', temporary: null })
const proof = (faults: number): LogBody => ({
  kind: 'proofRun',
  starts: 5,
  minutes: 5,
  faults,
  hot: true,
  words: null,
  boundExact: null,
  boundRuleOfThree: null,
})

/** Set-ups with what they need in turn. */
function withNeeds(index: BookIndex, setups: readonly string[]): string[] {
  return setups.flatMap((one) => [...withNeeds(index, index.setups.get(one)?.requires ?? []), one])
}

/** The case of a job so far. */
export function caseOf(of: {
  index: BookIndex
  told: Features
  symptom: string
  bodies: readonly LogBody[]
}): Case {
  const entries = of.bodies.map((body, n): LogEntry => {
    const at = new Date(Date.UTC(2026, 10, 24, 12, n)).toISOString()
    return {
      id: id(n),
      jobId: id(9_000),
      supersedes: null,
      happenedAt: at,
      writtenAt: at,
      zone: 'Etc/UTC',
      authorId: id(9_001),
      deviceId: id(9_002),
      engineVersion: '4',
      bookVersion: 1,
      body,
    }
  })
  const complaint = { words: '', symptom: of.symptom, lampOn: null }
  return buildCase({
    index: of.index,
    features: of.told,
    spec: null,
    job: { complaint },
    entries,
    meter: null,
  })
}

/** How many equally likely suspects would be as open as these (exp of the entropy). */
export function effective(chances: readonly number[]): number {
  const sum = chances.reduce((a, b) => a + b, 0)
  return Math.exp(
    -chances.reduce((total, x) => total + (x > 0 ? (x / sum) * Math.log(x / sum) : 0), 0),
  )
}

/** The product: what the plan says. */
export const byPlan: Policy = (c) => {
  const { next, stage } = nextStep(c, MEANS)
  if (stage === 'prove') throw new Error('a failed fix is not to be proved')
  return { type: next.type, id: next.id }
}

/** Checks in a drawn order until a suspect stands at 70 of 100 or none are left, then repairs by chance. */
export function randomly(random: () => number): Policy {
  let order: string[] | null = null
  return (c, failed) => {
    order ??= shuffled(checksFor(c.index, c.features), random)
    const { suspects } = belief(c)
    const told = (suspects[0]?.chance ?? 0) >= 0.7
    const listed = new Set(suspects.map((s) => s.fault))
    while (!told && failed.length === 0 && order.length > 0) {
      const next = order.shift()
      const check = next === undefined ? undefined : c.index.checks.get(next)
      const touches = Object.keys(check?.table ?? {}).some((fault) => listed.has(fault))
      const done = c.entries.some(({ body }) => 'checkId' in body && body.checkId === next)
      if (check && touches && !done) return { type: 'check', id: check.id }
    }
    return mostLikely(c, failed)
  }
}

const MOST_REPAIRS = 6

/** No checks: the likeliest suspect is repaired, then the next, six at most; then the tow. */
export const mostLikely: Policy = (c, failed) => {
  const next = belief(c).suspects.find(
    ({ fault }) => !failed.includes(fault) && (c.index.faults.get(fault)?.repair ?? null) !== null,
  )
  return next === undefined || failed.length >= MOST_REPAIRS
    ? { type: 'stop', id: 'tow' }
    : { type: 'repair', id: next.fault }
}
