// The optimum where it can be had: the likeliest suspects of a complaint with the checks that tell them apart.
import { planModel } from '@/lib/diag/plan-model'
import { nextAction } from '@/lib/diag/troubleshoot'
import { type SingleModel, START } from '@/lib/diag/troubleshoot-model'
import { treeCost } from '../../diag/tree-walk'
import { enginePolicy } from '../engine-policy'
import { caseOf, MEANS } from './drive'
import type { Given } from './machine'

const SUSPECTS = 6
const CHECKS = 8
/** Expansions after which the optimum is given up on. */
const PATIENT = 400_000

/** What the plan costs above the optimum, as a share of it; null when the optimum was not to be had. */
export function aboveOptimum(given: Given): number | null {
  const c = caseOf({ ...given, told: given.features, bodies: [] })
  const model = smaller(planModel(c, MEANS).model)
  const optimum = nextAction(model, START, PATIENT)
  return optimum.gap > 0 ? null : treeCost(model, enginePolicy(model)) / optimum.expectedCost - 1
}

/** The likeliest suspects, and of the checks those whose outcomes lie furthest apart between them. */
function smaller(model: SingleModel): SingleModel {
  const faults = [...model.faults].sort((a, b) => b.prior - a.prior).slice(0, SUSPECTS)
  const ids = faults.map((f) => f.id)
  const spread = ({ p, outcomes }: SingleModel['checks'][number]): number =>
    outcomes.reduce((sum, _, o) => {
      const chances = ids.map((id) => p[id]?.[o] ?? 0)
      return sum + Math.max(...chances) - Math.min(...chances)
    }, 0)
  const checks = [...model.checks].sort((a, b) => spread(b) - spread(a)).slice(0, CHECKS)
  return { ...model, faults, checks }
}
