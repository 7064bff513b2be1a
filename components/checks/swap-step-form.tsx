'use client'
import { useMemo } from 'react'
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

type Carried = { quantity: number; knownGood: boolean } | undefined
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
  const { key, done } = sourceKeys(jobId, swap.id, step)
  const first = useMemo(() => firstSource(step, carried), [step, carried])
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
    const clearDrafts = isLast(step, faultPresent) ? done : []
    if (await save([op], { clearDrafts })) onSaved(op.fields.id)
  }
  const words = STEP_WORDS[step]
  return (
    <section aria-labelledby="step" className="grid gap-3 border-2 border-ink p-3">
      <RuleEdge id="step">{words.title(name)}</RuleEdge>
      {step !== 'oldRefitted' && (
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

/**
 * Where a part comes from is asked of the good part and again of the new one: they are two parts, mostly of
 * two places. The old part is the machine's own, so its step keeps what was said of the good one.
 */
function sourceKeys(jobId: Id, swapId: string, step: SwapStep): { key: string; done: string[] } {
  const good = `swap:${jobId}:${swapId}`
  const fresh = `${good}:new`
  return { key: step === 'newFitted' ? fresh : good, done: [good, fresh] }
}

/** What stands there before anything is picked: the bag when it has one, else a twin, or for a new part the shop. */
export const firstSource = (step: SwapStep, carried: Carried): Source => ({
  from: carried !== undefined ? 'bag' : step === 'newFitted' ? 'shop' : 'twin',
  knownGood: carried?.knownGood === true ? 'yes' : 'no',
  words: '',
})

/** True when the round ends with this answer: what was said of the parts is of no use to the next one. */
export const isLast = (step: SwapStep, faultPresent: boolean | null): boolean =>
  step === 'newFitted' || (step === 'spareFitted' && faultPresent === true)

function partWords(source: Source, step: SwapStep, faultPresent: boolean | null): string | null {
  if (step === 'oldRefitted') return faultPresent === null ? 'not swapped back' : null
  const good = source.knownGood === 'yes' ? 'known good' : 'not known to be good'
  const which = source.from === 'twin' ? source.words.trim() : ''
  return [good, which].filter((word) => word !== '').join('; ')
}

type SourceProps = {
  value: Source
  onChange: (next: Source) => void
  carried: Carried
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
