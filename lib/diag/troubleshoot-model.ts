/** The models of engine.md 2.1 as data; a file of them is read by `readModel`. All costs in one currency. */
export type RepairSpec = {
  cost: number
  minutes: number
  setup: readonly string[]
  needsPart?: string
  success?: number
}

/** Exactly one fault is present; priors are normalised. Costs in one currency, times in minutes, chances 0 to 1. */
export type SingleModel = {
  id?: string
  kind: 'single'
  ratePerMinute: number
  faults: readonly { id: string; prior: number; repair: RepairSpec | null }[]
  extraRepairs?: readonly (Omit<RepairSpec, 'success'> & {
    id: string
    fixes: Readonly<Record<string, number>>
  })[]
  parts?: { onHand: readonly string[] }
  checks: readonly {
    id: string
    cost: number
    minutes: number
    setup: readonly string[]
    outcomes: readonly string[]
    p: Readonly<Record<string, readonly number[]>>
  }[]
  setups?: readonly {
    id: string
    cost?: number
    minutes: number
    requires: readonly string[]
    closedByTest: boolean
  }[]
  verify?: {
    cost: number
    minutes: number
    falsePass?: number | Readonly<Record<string, number>>
    comebackCost?: number
  }
  stops: readonly {
    id: string
    cost: number
    minutes?: number
    costByFault?: Readonly<Record<string, number>>
  }[]
  daylight?: { minutes: number }
}

/** Where a job stands: outcomes by check, repairs tried and failed, set-ups open, minutes gone. */
export type SearchState = {
  evidence: Readonly<Record<string, string>>
  tried: readonly string[]
  open: readonly string[]
  elapsed: number
}

/** Independent faults and what shows them; chances 0 to 1, `virtual` the likelihoods if absent and if present. */
export type NoisyOrModel = {
  id?: string
  kind: 'noisyor'
  condition: 'none' | 'atLeastOne'
  faults: readonly { id: string; prior: number }[]
  findings: readonly { id: string; leak: number; links: Readonly<Record<string, number>> }[]
  evidence: Readonly<Record<string, 0 | 1 | { virtual: readonly [number, number] }>>
}

/** The start of a job: nothing done, nothing open. */
export const START: SearchState = { evidence: {}, tried: [], open: [], elapsed: 0 }
