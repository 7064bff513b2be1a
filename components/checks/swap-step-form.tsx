'use client'
import type { SwapBody, SwapStep } from '@/lib/diag/swap-progress'
import type { SwapItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { useDraft } from '../store/use-draft'
import { useBag } from '../store/use-rows'
import { useStamp } from '../store/use-stamp'
import { Caution } from '../ui/caution'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { STEP_WORDS } from './swap-words'
import { NotSaved, useSave } from './use-save'

type Source = { from: SwapBody['partFrom']; knownGood: 'yes' | 'no'; words: string }

type Props = {
  jobId: Id
  swap: SwapItem
  /** The part by the name of the trade. */
  part: string
  step: SwapStep
  onSaved: (entryId: Id) => void
}

/** The one step that is open now, with its answers as big keys. */
export function SwapStepForm({ jobId, swap, part, step, onSaved }: Props) {
  const bag = useBag()
  const carried = bag?.parts.find((one) => one.part === swap.part && one.quantity > 0)
  const key = `swap:${jobId}:${swap.id}`
  const first: Source = {
    from: carried === undefined ? 'twin' : 'bag',
    knownGood: carried?.knownGood === true ? 'yes' : 'no',
    words: '',
  }
  const { value: source, set } = useDraft<Source>(key, first)
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const name = part.toLowerCase()
  const keep = async (faultPresent: boolean | null) => {
    const body: SwapBody = {
      kind: 'swap',
      swapId: swap.id,
      step,
      faultPresent,
      partFrom: source.from,
      partWords: partWords(source, step, faultPresent),
    }
    const op = stamp.entry(jobId, body)
    if (await save([op])) onSaved(op.fields.id)
  }
  const words = STEP_WORDS[step]
  return (
    <section aria-labelledby="step" className="grid gap-3 border-2 border-ink p-3">
      <RuleEdge id="step">{words.title(name)}</RuleEdge>
      {step === 'spareFitted' && (
        <SourceForm value={source} onChange={set} carried={carried} part={name} />
      )}
      <p>{words.ask}</p>
      <div className="grid grid-cols-2 gap-2">
        <Key kind="plate" disabled={saving} onClick={() => keep(false)}>
          {words.gone}
        </Key>
        <Key kind="plate" disabled={saving} onClick={() => keep(true)}>
          {words.there}
        </Key>
      </div>
      {step === 'oldRefitted' && (
        <Key quiet disabled={saving} onClick={() => keep(null)}>
          The old one is not refitted
        </Key>
      )}
      <NotSaved problem={problem} />
    </section>
  )
}

function partWords(source: Source, step: SwapStep, faultPresent: boolean | null): string | null {
  if (step === 'oldRefitted') return faultPresent === null ? 'not swapped back' : null
  const good = source.knownGood === 'yes' ? 'known good' : 'not known to be good'
  return [good, source.words.trim()].filter((word) => word !== '').join('; ')
}

type SourceProps = {
  value: Source
  onChange: (next: Source) => void
  carried: { quantity: number; knownGood: boolean } | undefined
  part: string
}

/** Where the good part comes from, and whether anybody knows that it is good. */
function SourceForm({ value, onChange, carried, part }: SourceProps) {
  return (
    <div className="grid gap-3">
      <Choice
        legend="The part comes from"
        value={value.from}
        onChange={(from) => onChange({ ...value, from })}
        options={[
          {
            value: 'bag',
            label: 'My bag',
            hint: carried === undefined ? `no ${part} in it` : `${carried.quantity} there`,
            disabled: carried === undefined,
          },
          { value: 'twin', label: 'A machine of the same model' },
          { value: 'shop', label: 'The shop' },
        ]}
      />
      {value.from === 'twin' && (
        <Field
          label="Which machine"
          hint="It is without its part until that is put back and recorded."
          value={value.words}
          onChange={(words) => onChange({ ...value, words })}
          maxLength={120}
        />
      )}
      <Choice
        legend="Known to be good"
        columns={2}
        value={value.knownGood}
        onChange={(knownGood) => onChange({ ...value, knownGood })}
        options={[
          { value: 'yes', label: 'Yes' },
          { value: 'no', label: 'Not known' },
        ]}
      />
      {value.knownGood === 'no' && (
        <Caution signal="NOTICE">
          If this part is bad as well, the swap shows no change and points the wrong way.
        </Caution>
      )}
    </div>
  )
}
