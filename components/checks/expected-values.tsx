import type { Judged } from '@/lib/diag/spec-of'
import type { CheckItem } from '@/lib/model/code-book'
import { RuleEdge } from '../ui/rule-edge'
import { provenanceOf } from './spec-words'
import { onScreen } from './words'

/** What to expect, each with where it comes from, and what a pass leaves open. */
export function ExpectedValues({ check, judged }: { check: CheckItem; judged: Judged }) {
  return (
    <section aria-labelledby="expected" className="grid gap-2">
      <RuleEdge id="expected">What to expect</RuleEdge>
      {check.reading !== null && <p className="font-bold">{onScreen(provenanceOf(judged))}</p>}
      {judged.value?.conditions != null && <p>Holds for: {judged.value.conditions}.</p>}
      <ul className="grid gap-2">
        {check.expected.map((one) => (
          <li key={one.words}>
            {onScreen(one.words)}
            <span className="block text-second text-ink2">{sourceLabel(one.source)}</span>
          </li>
        ))}
      </ul>
      <p>
        <b>A pass does not prove:</b> {check.passDoesNotProve}
      </p>
      {check.stopWhen !== null && (
        <p>
          <b>Stop when:</b> {check.stopWhen}
        </p>
      )}
      <p className="text-second text-ink2">
        Outcome table: {check.basisWords} {sourceLabel(check.source)}
      </p>
    </section>
  )
}

const sourceLabel = (source: string): string =>
  `${source.slice(0, 1).toUpperCase()}${source.slice(1)}${source.endsWith('.') ? '' : '.'}`
