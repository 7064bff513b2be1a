import type { CheckItem, SymptomItem } from './code-book'

const STATES: Record<SymptomItem['engine'], readonly CheckItem['machineState'][]> = {
  runs: ['off', 'keyOn', 'cranking', 'runningNeutral', 'guardedStand'],
  cranks: ['off', 'keyOn', 'cranking'],
  still: ['off', 'keyOn'],
}

/** Whether an engine that can be brought so far can be brought into the state a check wants. */
export const allows = (engine: SymptomItem['engine'], state: CheckItem['machineState']): boolean =>
  STATES[engine].includes(state)
