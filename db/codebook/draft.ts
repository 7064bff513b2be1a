import type { Caution, CheckItem } from '@/lib/model/code-book'
import type { FaultData } from './fault-data'
import { GUESS } from './sources'

type Given =
  | 'id'
  | 'name'
  | 'purpose'
  | 'gate'
  | 'minutes'
  | 'record'
  | 'table'
  | 'otherwise'
  | 'passDoesNotProve'
  | 'basis'
  | 'basisWords'
type Left = 'kind' | 'roles' | 'steps' | 'outcomes' | 'tools'

/** A check as it is written down: what is left out is said by `check`. */
export type CheckDraft = Pick<CheckItem, Given> &
  Partial<Omit<CheckItem, Given | Left>> & {
    tools?: readonly (string | readonly [tool: string, accuracy: string])[]
    /** In order; a step with its own caution is a pair, and the caution is shown before the step. */
    steps: readonly (string | readonly [text: string, caution: Caution])[]
    /** From good to plain bad; only the first is good. */
    outcomes: readonly (readonly [id: string, name: string])[]
  }

/**
 * The whole record of a check (rule R24). Left out means: one person, a mechanic's work, a lamp is light enough, any
 * weather, nothing to open, no tools, machine off, uses nothing up, no reading. An engine that turns may move the
 * machine.
 */
export function check({ tools = [], steps, outcomes, ...draft }: CheckDraft): CheckItem {
  const machineState = draft.machineState ?? 'off'
  const guideSafe = draft.guideSafe ?? false
  return {
    kind: 'check',
    people: 1,
    onePersonWay: null,
    guideSafe,
    roles: guideSafe ? ['mechanic', 'guide'] : ['mechanic'],
    light: 'lampEnough',
    weather: null,
    setups: [],
    machineState,
    mayMoveMachine: machineState !== 'off' && machineState !== 'keyOn',
    costMinor: 0,
    cautions: [],
    expected: [],
    reading: null,
    stopWhen: null,
    source: GUESS,
    ...draft,
    tools: tools.map((tool) =>
      typeof tool === 'string' ? { tool, accuracy: null } : { tool: tool[0], accuracy: tool[1] },
    ),
    steps: steps.map((step) =>
      typeof step === 'string'
        ? { text: step, caution: null }
        : { text: step[0], caution: step[1] },
    ),
    outcomes: outcomes.map(([id, name], i) => ({ id, name, good: i === 0 })),
  }
}

type Repair = NonNullable<FaultData['repair']>
type RepairDraft = Pick<Repair, 'words' | 'minutes' | 'successOf100'> & Partial<Repair>

/** A fault as it is written down: what is left out is said by `fault`. */
export type FaultDraft = Omit<
  FaultData,
  'gate' | 'circuits' | 'repair' | 'onset' | 'limpRefused'
> & {
  gate?: FaultData['gate']
  circuits?: FaultData['circuits']
  repair: RepairDraft | null
  onset?: string
  limpRefused?: string
}

/**
 * The whole record of a fault. Left out means: every machine, in no circuit a code names, nothing refused; a repair
 * that needs no part, no set-up and uses nothing up.
 */
export function fault({ repair, onset, limpRefused, ...draft }: FaultDraft): FaultData {
  return {
    gate: {},
    circuits: [],
    ...draft,
    repair: repair && { doesNotFix: null, costMinor: 0, part: null, setups: [], ...repair },
    onset: onset ?? null,
    limpRefused: limpRefused ?? null,
  }
}
