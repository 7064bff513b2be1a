import { JawGlyph } from './jaw-glyph'
import { type Across, type Verdict, verdictWords } from './verdict'

/** Colour of the verdict word: ink in the day theme, where coloured words are the first to go. */
const VERDICT_INK: Record<Verdict, string> = {
  in: 'text-(--verdict-go)',
  outLow: 'text-(--verdict-nogo)',
  outHigh: 'text-(--verdict-nogo)',
  tooClose: 'text-(--verdict-close)',
}

type Props = { verdict: Verdict | null; across?: Across; large?: boolean }

/** Jaw glyph and verdict word in one line, as the log and the desk show it. */
export function VerdictLine({ verdict, across = 'low', large = false }: Props) {
  return (
    <span className="inline-flex items-center gap-2">
      <JawGlyph verdict={verdict} across={across} size={large ? 25 : 20} />
      <span
        className={`caps ${large ? 'text-key' : 'text-section'} ${verdict === null ? 'text-ink2' : VERDICT_INK[verdict]}`}
      >
        {verdictWords(verdict)}
      </span>
    </span>
  )
}
