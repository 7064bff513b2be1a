// The twelve described machines: what the plan does on each, beside the two other ways to go about it.
import type { BookIndex } from '@/lib/diag/book-index'
import { randomFrom } from '../diag/models'
import { mean, table } from '../marked-part'
import { ANSWERED_CASES } from './cases'
import { describedAnswers, describedMachine } from './described'
import { byPlan, type Drive, drive, mostLikely, type Policy, randomly } from './drive'

const DRAWN_ORDERS = 20

const endOf = (drives: readonly Drive[]): string => {
  const [right, fixed] = (['rightAtEnd', 'fixed'] as const).map(
    (key) => drives.filter((d) => d[key]).length,
  )
  const of = drives.length === 1 ? '' : ` of ${drives.length}`
  const said = drives.length === 1 ? (right ? 'right' : 'wrong') : `${right}${of} right`
  const done = drives.length === 1 ? (fixed ? 'fixed' : 'not fixed') : `${fixed}${of} fixed`
  return `${said}, ${done}, ${mean(drives.map((d) => d.checks)).toFixed(1)} checks, ${mean(drives.map((d) => d.minutes)).toFixed(0)} min`
}

/** One row for each machine; `told` prints what was done on it. */
export function describedTable(index: BookIndex, told: (words: string) => void): string {
  const rows = ANSWERED_CASES.map(({ stranded, answered }) => {
    const machine = describedMachine(stranded, answered)
    const answers = describedAnswers(index, stranded, answered)
    const go = (policy: Policy) =>
      drive({ index, machine, told: stranded.features, policy, answers })
    const plan = go(byPlan)
    const drawn = Array.from({ length: DRAWN_ORDERS }, (_, i) => go(randomly(randomFrom(i + 1))))
    told(`${stranded.name}: ${plan.acts.join(', ')}`)
    return [
      stranded.name,
      plan.openAfterLook.toFixed(1),
      endOf([plan]),
      endOf(drawn),
      endOf([go(mostLikely)]),
    ]
  })
  const head = ['machine', 'suspects open after the first look', 'by the plan']
  return table([...head, 'checks in a drawn order', 'likeliest first'], rows)
}
