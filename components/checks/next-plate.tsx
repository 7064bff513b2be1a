import type { BookIndex } from '@/lib/diag/book-index'
import { wordName } from '@/lib/diag/book-index'
import type { Plan, PlannedAction } from '@/lib/diag/plan'
import { Caution } from '../ui/caution'
import { Plate } from '../ui/plate'
import { minutesWords } from './words'

const HEADINGS: Record<PlannedAction['type'], string> = {
  check: 'Next best check',
  swap: 'Next best check: a swap',
  repair: 'Next best step: a repair',
  stop: 'Next best step: a way out',
}

type Props = { plan: Plan; decides: string; index: BookIndex }

/** The plate: what to do next, what it takes, what it decides. No score. */
export function NextPlate({ plan, decides, index }: Props) {
  const { next } = plan
  return (
    <Plate>
      <p className="text-second text-scribe2">
        {plan.stage === 'prove' ? 'Next: the proof run' : HEADINGS[next.type]}
      </p>
      <h2 className="caps mt-1 text-plate">{next.name}</h2>
      {next.type !== 'stop' && (
        <p className="mt-2 flex flex-wrap items-baseline gap-x-4 gap-y-1">
          <span className="figures text-key">{minutesWords(next.minutes)}</span>
          <span className="text-second text-scribe2">{needsWords(next, index)}</span>
        </p>
      )}
      <p className="mt-2 text-body">{decides}</p>
      {next.caution !== null && (
        <Caution signal={next.caution.signal} onPlate className="mt-3">
          {firstSentence(next.caution.text)}
        </Caution>
      )}
    </Plate>
  )
}

/** The plate has room for one line of risk; the check itself says it whole before the first step. */
const firstSentence = (text: string): string => /^.*?[.!](?=\s|$)/.exec(text)?.[0] ?? text

type Takes = Pick<PlannedAction, 'type' | 'minutes' | 'tools' | 'people'>

/** What a step takes, in one line. */
export function takesWords(step: Takes, index: BookIndex): string {
  if (step.type === 'stop') return 'way out'
  return [minutesWords(step.minutes), needsWords(step, index)].filter(Boolean).join(', ')
}

/** Tools by the names of the trade, and hands; nothing of tools where the book does not say. */
function needsWords({ tools, people }: Takes, index: BookIndex): string {
  const names = tools?.map((tool) => wordName(index, 'tool', tool).toLowerCase())
  const named = names?.length === 0 ? ['no tools'] : (names ?? [])
  return [...named, ...(people > 1 ? ['two people'] : [])].join(', ')
}
