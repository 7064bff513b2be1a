'use client'

import { useBook } from '@/components/store/use-book'
import { Choice } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { FeatureItem } from '@/lib/model/code-book'
import { FEATURES, type FeatureName, type Features } from '@/lib/model/features'
import type { Stranger } from './intake-draft'

type Props = { value: Stranger; onChange: (next: Stranger) => void }

/** Asked first, because most faults hang on them; the rest stays folded away. */
const FIRST: readonly FeatureName[] = ['kind', 'strokes', 'fuelling', 'cylinders', 'battery']
const NOT_KNOWN = 'notKnown'

/** A machine the shop has never seen: what it says on it, and what it is, in plain questions. */
export function StrangerForm({ value, onChange }: Props) {
  const { index } = useBook()
  const questions = [...(index?.features.values() ?? [])]
  const first = FIRST.flatMap((name) => questions.filter((q) => q.id === name))
  const rest = questions.filter((q) => !FIRST.some((name) => name === q.id))
  const ask = (question: FeatureItem) => (
    <FeatureQuestion
      key={question.id}
      question={question}
      features={value.features}
      onChange={(features) => onChange({ ...value, features })}
    />
  )
  return (
    <section className="grid gap-4">
      <RuleEdge>A stranger’s machine</RuleEdge>
      <Field
        label="Maker, as on the machine"
        value={value.maker}
        onChange={(maker) => onChange({ ...value, maker })}
        maxLength={60}
      />
      <Field
        label="Model, as on the machine"
        value={value.model}
        onChange={(model) => onChange({ ...value, model })}
        maxLength={60}
      />
      <Field
        label="Year, if known"
        value={value.year}
        onChange={(year) => onChange({ ...value, year: year.replace(/\D/g, '').slice(0, 4) })}
        inputMode="numeric"
        figures
      />
      {questions.length === 0 ? (
        <p className="text-ink2">
          The questions about the machine come with the code book, which is not on this phone yet.
          Lists are longer without the answers.
        </p>
      ) : null}
      {first.map(ask)}
      {rest.length > 0 ? (
        <details className="border-t-2 border-ink">
          <summary className="fold">
            More questions: {rest.length}. Each answer shortens the lists.
          </summary>
          <div className="grid gap-4 pt-2">{rest.map(ask)}</div>
        </details>
      ) : null}
    </section>
  )
}

function FeatureQuestion(props: {
  question: FeatureItem
  features: Features
  onChange: (next: Features) => void
}) {
  const { question, features, onChange } = props
  const name = question.id as FeatureName
  const values: readonly string[] = Object.hasOwn(FEATURES, name) ? FEATURES[name] : []
  const pick = (picked: string) => {
    const { [name]: _dropped, ...others } = features
    onChange(picked === NOT_KNOWN ? others : ({ ...others, [name]: picked } as Features))
  }
  return (
    <Choice
      legend={question.question}
      columns={2}
      value={features[name] ?? NOT_KNOWN}
      onChange={pick}
      options={[
        ...values.map((value) => ({ value, label: question.answers[value] ?? value })),
        { value: NOT_KNOWN, label: 'Not known' },
      ]}
    />
  )
}
