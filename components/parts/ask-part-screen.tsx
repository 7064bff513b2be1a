'use client'
import { wordName } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import { condemnedBy } from '@/lib/diag/condemned-by'
import { type AdvisedPart, adviceFor, adviceRecord, type SheetPart } from '@/lib/diag/part-choice'
import type { Id } from '@/lib/model/id'
import type { PartLine, PartRequest } from '@/lib/model/part-request'
import type { Shop } from '@/lib/model/shop'
import { CHOICE_WORDS, URGENCY_WORDS } from '@/lib/shop/part-words'
import { NotYours, useMay } from '../checks/use-may'
import { NotSaved, useSave } from '../checks/use-save'
import { useBelief } from '../engine/use-belief'
import { useCase } from '../engine/use-case'
import { useRoute } from '../field/router'
import { entryMention } from '../log/entry-words'
import { useBook } from '../store/use-book'
import { useDraft } from '../store/use-draft'
import { useShop } from '../store/use-rows'
import { useStamp } from '../store/use-stamp'
import { announce } from '../ui/announce'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import { Screen } from '../ui/screen'
import { Prices } from './part-prices'

type AskDraft = {
  quantity: number
  urgency: PartRequest['urgency']
  choice: PartLine['choice'] | null
  position: string
  note: string
}
const FIRST: AskDraft = { quantity: 1, urgency: 'today', choice: null, position: '', note: '' }

/** Asking the shop for one part: which, how many, how soon, genuine or aftermarket with the sum (F8). */
export function AskPartScreen({ jobId }: { jobId: Id }) {
  const { search } = useRoute()
  const part = search.get('part')
  const found = useCase(jobId)
  const { index, status } = useBook()
  const shop = useShop()
  const mine = useMay('part.ask')
  if (!mine)
    return (
      <Screen title="Ask for a part">
        <NotYours what="Asking for parts" />
      </Screen>
    )
  if (part === null || part === '')
    return (
      <Screen title="Ask for a part">
        <p>Pick the part from a suspect on the PARTS tab.</p>
      </Screen>
    )
  if (found === null || index === null)
    return (
      <Screen title="Ask for a part">
        {status === 'missing' ? (
          <p>
            Parts are named by the shop’s code book, and this phone has not fetched one yet. Open
            this once with signal, or write what is needed in a note.
          </p>
        ) : (
          <p role="status">Opening the job.</p>
        )}
      </Screen>
    )
  const sheet = found.spec?.parts.find((one) => one.part === part) ?? null
  return (
    <Ask
      jobId={jobId}
      part={part}
      name={wordName(index, 'part', part)}
      fault={search.get('fault')}
      sheet={sheet}
      shop={shop ?? null}
    />
  )
}

type AskProps = {
  jobId: Id
  part: string
  name: string
  fault: string | null
  sheet: SheetPart | null
  shop: Shop | null
}

function Ask({ jobId, part, name, fault, sheet, shop }: AskProps) {
  const key = `ask:${jobId}:${part}`
  const { value: draft, set, kept } = useDraft<AskDraft>(key, FIRST)
  const advised = adviceFor(sheet, shop?.recoveryMinor ?? null)
  const choice = draft.choice ?? firstChoice(sheet, advised)
  const condemned = useCondemned(jobId, fault)
  const { ask, saving, problem } = useAsk({ jobId, part, name, sheet, shop, key, advised })
  return (
    <Screen
      title={`Ask for: ${name}`}
      kept={kept}
      foot={
        <Key
          kind="main"
          disabled={saving || condemned.state === 'working'}
          onClick={() => ask({ ...draft, choice }, condemned.entry?.id ?? null)}
        >
          {condemned.state === 'working' ? 'Working it out' : 'Ask for it'}
        </Key>
      }
    >
      <Because condemned={condemned} />
      <Prices sheet={sheet} shop={shop} advised={advised} />
      <Choice
        legend="Which part"
        value={choice}
        onChange={(next) => set({ ...draft, choice: next })}
        options={choicesOf(sheet).map((value) => ({
          value,
          label: CHOICE_WORDS[value],
          ...(advised?.advice.advised === value ? { hint: 'advised' } : {}),
        }))}
      />
      <Quantity value={draft.quantity} onChange={(quantity) => set({ ...draft, quantity })} />
      <Choice
        legend="How soon"
        columns={3}
        value={draft.urgency}
        onChange={(urgency) => set({ ...draft, urgency })}
        options={(['now', 'today', 'thisWeek'] as const).map((value) => ({
          value,
          label: URGENCY_WORDS[value],
        }))}
      />
      <Field
        label="Position"
        hint="Front, left, cylinder. May stay empty"
        value={draft.position}
        onChange={(position) => set({ ...draft, position })}
        maxLength={60}
      />
      <Field
        label="Note to the parts desk"
        value={draft.note}
        onChange={(note) => set({ ...draft, note })}
        lines={2}
        maxLength={500}
      />
      <NotSaved problem={problem} />
    </Screen>
  )
}

function useAsk(of: {
  jobId: Id
  part: string
  name: string
  sheet: SheetPart | null
  shop: Shop | null
  key: string
  advised: AdvisedPart | null
}) {
  const { go, here } = useRoute()
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const ask = async (draft: AskDraft & { choice: PartLine['choice'] }, condemned: Id | null) => {
    const line: PartLine = {
      id: stamp.newId(),
      part: of.part,
      words: of.name,
      position: draft.position.trim() || null,
      quantity: draft.quantity,
      choice: draft.choice,
      number: numberOf(of.sheet, draft.choice),
      price: priceOf(of.sheet, draft.choice, of.shop),
      condemnedBy: condemned,
    }
    const fields: PartRequest = {
      id: stamp.newId(),
      jobId: of.jobId,
      askedAt: stamp.now(),
      urgency: draft.urgency,
      note: draft.note.trim() || null,
      lines: [line],
      advice: adviceRecord(of.advised),
    }
    if (!(await save([{ kind: 'partRequest.ask', fields }], { clearDrafts: [of.key] }))) return
    announce(`${of.name}: the request is saved on this phone.`)
    // In place of the form: Back must not lead to the same request once more.
    go(`/field/jobs/${of.jobId}/parts`, { replace: true, from: here })
  }
  return { ask, saving, problem }
}

type Condemned = {
  /** `none`: asked for without a suspect. `failed`: there is one, and its entry could not be worked out. */
  state: 'none' | 'working' | 'failed' | 'known'
  entry: { id: Id; words: string } | null
}

/** The entry that spoke most strongly for the fault, in words, once the newest one is counted. */
function useCondemned(jobId: Id, fault: string | null): Condemned {
  const found = useCase(jobId)
  const { index } = useBook()
  const { answer, working, failed } = useBelief(jobId)
  const state = condemnedState({
    asked: fault !== null,
    working: working || answer === null,
    failed,
  })
  const suspect = answer?.belief.suspects.find((one) => one.fault === fault)
  if (state !== 'known' || suspect === undefined || found === null || index === null)
    return { state, entry: null }
  const id = condemnedBy(suspect)
  const entry = living(found.entries).find((one) => one.id === id)
  if (entry === undefined) return { state, entry: null }
  return { state, entry: { id: entry.id, words: entryMention(entry.body, index) } }
}

/** How it stands with the entry behind a request; `working` also before the first answer. */
export function condemnedState(of: {
  asked: boolean
  working: boolean
  failed: boolean
}): Condemned['state'] {
  if (!of.asked) return 'none'
  if (of.failed) return 'failed'
  return of.working ? 'working' : 'known'
}

function Because({ condemned: { state, entry } }: { condemned: Condemned }) {
  if (state === 'failed')
    return <p>The suspects could not be worked out, so the request names no entry of the log.</p>
  return entry === null ? null : (
    <p>
      <b>Because of:</b> {entry.words}
    </p>
  )
}

const choicesOf = (sheet: SheetPart | null): readonly PartLine['choice'][] =>
  sheet === null || sheet.aftermarketMinor === null
    ? ['genuine', 'either']
    : ['genuine', 'aftermarket', 'either']

function firstChoice(sheet: SheetPart | null, advised: AdvisedPart | null): PartLine['choice'] {
  const by = advised?.advice.advised
  if (by === 'genuine' || by === 'aftermarket') return by
  return sheet === null ? 'either' : 'genuine'
}

const numberOf = (sheet: SheetPart | null, choice: PartLine['choice']): string | null =>
  choice === 'genuine'
    ? (sheet?.genuineNumber ?? null)
    : choice === 'aftermarket'
      ? (sheet?.aftermarketNumber ?? null)
      : null

function priceOf(sheet: SheetPart | null, choice: PartLine['choice'], shop: Shop | null) {
  const minor =
    choice === 'genuine'
      ? sheet?.genuineMinor
      : choice === 'aftermarket'
        ? sheet?.aftermarketMinor
        : null
  return minor == null || shop === null ? null : { minor, currency: shop.currency }
}

function Quantity({ value, onChange }: { value: number; onChange: (next: number) => void }) {
  return (
    <fieldset className="grid grid-cols-[auto_1fr_auto] items-center gap-3">
      <legend className="mb-1.5 font-bold">How many</legend>
      <Key aria-label="One less" disabled={value <= 1} onClick={() => onChange(value - 1)}>
        −
      </Key>
      <output className="figures text-center text-figure">{value}</output>
      <Key aria-label="One more" disabled={value >= 999} onClick={() => onChange(value + 1)}>
        +
      </Key>
    </fieldset>
  )
}
