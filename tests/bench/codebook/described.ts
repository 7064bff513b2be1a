// A machine that was described in words, as one that answers: every check ends as its description says, never drawn.
import type { BookIndex } from '@/lib/diag/book-index'
import type { Answers } from './drive'
import { type Machine, swapSteps } from './machine'
import { type Answered, SOMETHING_ELSE_TRUE, type Stranded } from './stranded'

export function describedMachine(of: Stranded, told: Answered): Machine {
  return {
    symptom: of.symptom,
    features: of.features,
    faults: of.faults.filter((fault) => fault !== SOMETHING_ELSE_TRUE),
    conditions: told.conditions,
  }
}

/** Ends of checks and swaps as told; a repair of what is wrong always takes. */
export function describedAnswers(index: BookIndex, of: Stranded, told: Answered): Answers {
  const endsOf = (machine: Machine) => {
    const mended = of.faults.filter((fault) => !machine.faults.includes(fault))
    return (mended.length === 1 && told.after?.[mended[0] ?? '']) || told.ends
  }
  return {
    check: (machine, checkId) => {
      if (told.cannot.includes(checkId))
        return { kind: 'couldNot', checkId, reason: 'Not to be done on this machine.' }
      const outcome = endsOf(machine)[checkId] ?? index.checks.get(checkId)?.outcomes[0]?.id ?? ''
      return { kind: 'check', checkId, outcome, asWritten: true, differed: null }
    },
    swap: (_, swapId) => swapSteps(swapId, told.swaps[swapId] ?? 0),
    repair: (machine, fault) => ({
      ...machine,
      faults: machine.faults.filter((one) => one !== fault),
    }),
  }
}
