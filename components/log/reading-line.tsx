import type { ReadingBody } from '@/lib/model/log-entry'
import { unitLabel } from '../reading-strip/unit-words'
import { VerdictLine } from '../reading-strip/verdict-line'
import { classes } from '../ui/class-names'
import { Figure } from '../ui/figure'

type Props = { body: ReadingBody; struck?: boolean; large?: boolean }

/** The figure of a reading as it was typed, with its unit and the verdict it was saved with. */
export function ReadingLine({ body, struck = false, large = false }: Props) {
  return (
    <span className={classes('flex flex-wrap items-center gap-x-3', struck && 'line-through')}>
      <Figure
        value={body.overRange ? `OL > ${body.asTyped}` : body.asTyped}
        unit={unitLabel(body.quantity, body.unit)}
        size={large ? 'figure' : 'row'}
      />
      <VerdictLine verdict={body.result?.verdict ?? null} large={large} />
    </span>
  )
}
