import type { BookIndex } from '@/lib/diag/book-index'
import type { SpecComponent } from '@/lib/diag/spec-of'
import type { CheckItem } from '@/lib/model/code-book'
import type { SpecSheet } from '@/lib/model/machine-model'
import { Figure } from '../ui/figure'
import { Pins } from '../ui/pins'
import { RuleEdge } from '../ui/rule-edge'
import { minutesWords } from './words'

type Props = { check: CheckItem; spec: SpecSheet | null; index: BookIndex }

/** Where the component sits and how to get at it, from the model's spec sheet (rule R18). */
export function WhereItIs({ check, spec, index }: Props) {
  const parts = componentsOf(check, spec, index)
  return (
    <section aria-label="Where it is" className="grid gap-3">
      {parts.map((part) => (
        <Place key={part.id} part={part} index={index} />
      ))}
      {parts.length === 0 && (
        <p className="text-second text-ink2">
          {spec === null
            ? 'This model has no spec sheet: place, pins and colours are not known.'
            : 'The spec sheet has no place for this check.'}
        </p>
      )}
    </section>
  )
}

/** The component the reading names, else those whose circuit the check's faults sit in. */
function componentsOf(check: CheckItem, spec: SpecSheet | null, index: BookIndex): SpecComponent[] {
  if (spec === null) return []
  const { reading } = check
  if (reading !== null) return spec.components.filter((one) => one.id === reading.component)
  const circuits = new Set(
    Object.keys(check.table).flatMap((fault) =>
      (index.faults.get(fault)?.circuits ?? []).map((one) => one.circuit),
    ),
  )
  return spec.components.filter((one) => circuits.has(one.id)).slice(0, 2)
}

function Place({ part, index }: { part: SpecComponent; index: BookIndex }) {
  const setups = part.setups.map((id) => index.setups.get(id)).filter((one) => one !== undefined)
  return (
    <div className="grid gap-2">
      <RuleEdge>{part.name}: where</RuleEdge>
      <p>{part.place}</p>
      {setups.length > 0 && (
        <p>
          First:{' '}
          {setups
            .map((one) => `${one.name.toLowerCase()} (${minutesWords(one.minutes)})`)
            .join(', ')}
          .
        </p>
      )}
      {part.fasteners !== null && <p>{part.fasteners}</p>}
      {part.torqueNm !== null && (
        <p>
          Tighten to <Figure value={part.torqueNm} unit="N m" size="body" />.
        </p>
      )}
      {part.connector !== null && <p>{part.connector}</p>}
      {part.pins.length > 0 && <Pins pins={part.pins} />}
      <p className="text-second text-ink2">Spec sheet: {part.source}.</p>
    </div>
  )
}
