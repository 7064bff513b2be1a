'use client'
import { wordName } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import { condemnedBy } from '@/lib/diag/condemned-by'
import { type AdvisedPart, adviceFor, adviceRecord, type SheetPart } from '@/lib/diag/part-choice'
import type { Id } from '@/lib/model/id'
import type { PartLine, PartRequest } from '@/lib/model/part-request'
import type { Shop } from '@/lib/model/shop'
import { moneyWords } from '@/lib/shop/currency'
import { CHOICE_WORDS, URGENCY_WORDS } from '@/lib/shop/part-words'
import { NotYours, useMay } from '../checks/use-may'
import { NotSaved, useSave } from '../checks/use-save'
import { useBelief } from '../engine/use-belief'
import { useCase } from '../engine/use-case'
import { useRoute } from '../field/router'
import { entryMention } from '../log/entry-words'
import { fixed } from '../reading-strip/figures'
import { useBook } from '../store/use-book'
import { useDraft } from '../store/use-draft'
import { useShop } from '../store/use-rows'
import { useStamp } from '../store/use-stamp'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { Key } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { adviceSentences } from './part-advice'

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
          disabled={saving}
          onClick={() => ask({ ...draft, choice }, condemned?.id ?? null)}
        >
          Ask for it
        </Key>
      }
    >
      {condemned !== null && (
        <p>
          <b>Because of:</b> {condemned.words}
        </p>
      )}
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
  const { go } = useRoute()
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
    if (await save([{ kind: 'partRequest.ask', fields }], { clearDrafts: [of.key] }))
      go(`/field/jobs/${of.jobId}/parts`)
  }
  return { ask, saving, problem }
}

/** The entry that spoke most strongly for the fault, in words. */
function useCondemned(jobId: Id, fault: string | null): { id: Id; words: string } | null {
  const found = useCase(jobId)
  const { index } = useBook()
  const { answer } = useBelief(jobId)
  const suspect = answer?.belief.suspects.find((one) => one.fault === fault)
  if (suspect === undefined || found === null || index === null) return null
  const id = condemnedBy(suspect)
  const entry = living(found.entries).find((one) => one.id === id)
  return entry === undefined ? null : { id: entry.id, words: entryMention(entry.body, index) }
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

type PricesProps = { sheet: SheetPart | null; shop: Shop | null; advised: AdvisedPart | null }

/** Prices, failure figures, the second recovery, the break-even and what follows. */
function Prices({ sheet, shop, advised }: PricesProps) {
  if (sheet === null || shop === null)
    return <p>The spec sheet has no price for this part. The parts desk finds it out.</p>
  const money = (minor: number) => moneyWords(minor, shop.currency)
  const rows: [string, string, string][] = [
    ['Genuine', money(sheet.genuineMinor), failWords(sheet.genuineFailsOf100)],
  ]
  if (sheet.aftermarketMinor !== null)
    rows.push([
      'Aftermarket',
      money(sheet.aftermarketMinor),
      sheet.aftermarketFailsOf100 === null ? 'no figure' : failWords(sheet.aftermarketFailsOf100),
    ])
  rows.push(['Second recovery', money(shop.recoveryMinor), 'when it fails out there'])
  return (
    <section aria-labelledby="prices" className="grid gap-2">
      <RuleEdge id="prices">Genuine or aftermarket</RuleEdge>
      <table className="w-full border-collapse text-left">
        <caption className="visually-hidden">Prices and how many of 100 fail</caption>
        <tbody>
          {rows.map(([label, price, fails]) => (
            <tr key={label} className="border-b-[1.5px] border-rule align-baseline">
              <th scope="row" className="py-2 pr-2 font-bold">
                {label}
                <span className="block text-second font-normal text-ink2">{fails}</span>
              </th>
              <td className="figures py-2 text-right">{price}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {advised !== null && (
        <div className="grid gap-1 border-l-4 border-ink pl-3">
          {adviceSentences(advised, shop.currency).map((words, i, all) => (
            <p key={words} className={i === all.length - 1 ? 'text-row font-bold' : ''}>
              {words}
            </p>
          ))}
        </div>
      )}
      <p className="text-second text-ink2">Prices and failure figures: {sheet.source}.</p>
    </section>
  )
}

const failWords = (of100: number): string =>
  `${fixed(of100, Number.isInteger(of100) ? 0 : 1)} of 100 fail`

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
