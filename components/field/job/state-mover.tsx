'use client'

import { useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { FRESH_WAY_OUT, type WayOutDraft, wayOutDraftKey } from '@/components/outcome/way-out-draft'
import { useDraft } from '@/components/store/use-draft'
import { useSession } from '@/components/store/use-session'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Choice } from '@/components/ui/choice'
import { DraftSign } from '@/components/ui/draft-sign'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import type { Job } from '@/lib/model/job'
import { jobHref } from '../route'
import { useRoute } from '../router'
import { lineOf, movesTo, optionsOf, type Which } from './state-moves'

const LEGENDS: Record<Which, string> = {
  people: 'Where are the people now?',
  machine: 'What about the machine now?',
  job: 'The job is now',
}

/** What is picked and typed, kept to the keystroke (rule R8). */
type MoveDraft = { to: string | null; why: string }
const FIRST: MoveDraft = { to: null, why: '' }

type Props = { which: Which; job: Job; onDone: () => void }

/** The states that may follow; the chosen one is recorded with a word on why. */
export function StateMover({ which, job, onDone }: Props) {
  const key = `job.${job.id}.state.${which}`
  const { value: draft, set, ready, kept } = useDraft<MoveDraft>(key, FIRST)
  const { save, saving, problem } = useSave()
  const stamp = useStamp()
  const session = useSession()
  const [missing, setMissing] = useState<string | null>(null)
  const options = optionsOf(which, job, session.kind === 'ready' ? session.actor.roles : [])
  const to = options.some(({ value }) => value === draft.to) ? draft.to : null
  const leaves = which === 'machine' && to === 'leftBehind'
  const keep = async () => {
    if (to === null) {
      setMissing('Pick the new state first.')
      return
    }
    const words = draft.why.trim() === '' ? null : draft.why.trim()
    const line = lineOf(which, to, words)
    const ops = movesTo(which, job, to, words)
    const all = line === null ? ops : [...ops, stamp.entry(job.id, line)]
    if (!(await save(all, { clearDrafts: [key] }))) return
    announce('Saved on this phone.')
    onDone()
  }
  return (
    <div className="grid gap-3 border-b-2 border-ink pb-4">
      <Choice
        legend={LEGENDS[which]}
        value={to}
        onChange={(next) => {
          setMissing(null)
          set({ ...draft, to: next })
        }}
        options={options}
        error={missing}
      />
      <Field
        label="Why, in a few words"
        value={draft.why}
        onChange={(why) => set({ ...draft, why })}
        maxLength={500}
        autoCapitalize="sentences"
      />
      <DraftSign kept={kept} />
      <NotSaved problem={problem} />
      {leaves ? (
        <LeaveIt jobId={job.id} why={draft.why} />
      ) : (
        <Key kind="plate" disabled={!ready || saving} onClick={keep}>
          Save
        </Key>
      )}
    </div>
  )
}

/** Leaving a machine behind asks for more than a word (rule R2): it goes on in the way out, with what was typed. */
function LeaveIt({ jobId, why }: { jobId: string; why: string }) {
  const { value, set, ready } = useDraft<WayOutDraft>(wayOutDraftKey(jobId), FRESH_WAY_OUT)
  const { go } = useRoute()
  const goOn = () => {
    const reasons = value.reasons.trim() === '' ? why : value.reasons
    set({ ...value, way: 'returnLater', machine: 'leftBehind', people: null, reasons })
    go(jobHref(jobId, 'wayout'))
  }
  return (
    <>
      <p>
        Whoever fetches it has only what you write: where it stands, a photo, key, fuel tap, how it
        is secured, whose land it is and when it is fetched.
      </p>
      <Key kind="plate" disabled={!ready} onClick={goOn}>
        Go on in the way out
      </Key>
    </>
  )
}
