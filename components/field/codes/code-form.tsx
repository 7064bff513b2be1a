'use client'

import { useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { useDraft } from '@/components/store/use-draft'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Choice } from '@/components/ui/choice'
import { DraftSign } from '@/components/ui/draft-sign'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { useFocusInvalid } from '@/components/ui/use-focus-invalid'
import type { LogBody } from '@/lib/model/log-entry'
import { fail, ok, type Result } from '@/lib/model/result'
import { usePatch } from '../use-patch'
import {
  CODE_FORMATS,
  type CodeDraft,
  type CodeFormat,
  type CodeProblem,
  codeKey,
  contextOf,
  EMPTY_CODE,
  seenOf,
} from './code-draft'
import { DashPhoto } from './dash-photo'

const FORMAT_WORDS: Record<CodeFormat, string> = {
  spn: 'Numbers: SPN and FMI',
  pcode: 'Letter and digits: P0000',
  flash: 'Flashes of the lamp',
  asShown: 'Something else, as shown',
  unreadable: 'Cannot be read',
}

type Props = { jobId: string; order: number; onSaved: (entryId: string) => void }

/** Takes one code down as the dash shows it. */
export function CodeForm({ jobId, order, onSaved }: Props) {
  const key = codeKey(jobId)
  const { value: draft, set, kept } = useDraft<CodeDraft>(key, EMPTY_CODE)
  const [problem, setProblem] = useState<CodeProblem | null>(null)
  useFocusInvalid(problem)
  const { save, saving, problem: notSaved } = useSave()
  const stamp = useStamp()
  const patch = usePatch(draft, set)
  const change = (next: Partial<CodeDraft>) => {
    setProblem(null)
    patch(next)
  }
  const keep = async () => {
    const body = bodyOf(draft, order)
    if (!body.ok) {
      setProblem(body.problem)
      return
    }
    const entry = stamp.entry(jobId, body.value)
    if (!(await save([entry], { clearDrafts: [key] }))) return
    announce('Saved on this phone.')
    onSaved(entry.fields.id)
  }
  const errorOf = (field: keyof CodeDraft) => (problem?.field === field ? problem.words : null)
  return (
    <form
      className="grid gap-4"
      onSubmit={(e) => {
        e.preventDefault()
        void keep()
      }}
    >
      <Choice
        legend="What does the dash show?"
        value={draft.format}
        onChange={(format) => change({ format })}
        options={CODE_FORMATS.map((value) => ({ value, label: FORMAT_WORDS[value] }))}
        error={errorOf('format')}
      />
      <Boxes draft={draft} change={change} errorOf={errorOf} />
      {draft.format === 'unreadable' ? null : (
        <>
          <Choice
            legend="Shown as"
            columns={3}
            value={draft.status}
            onChange={(status) => change({ status })}
            options={[
              { value: 'active', label: 'Active' },
              { value: 'stored', label: 'Stored' },
              { value: 'unknown', label: 'Not said' },
            ]}
            error={errorOf('status')}
          />
          <Field
            label="Count, if it shows one"
            value={draft.count}
            onChange={(count) => change({ count })}
            inputMode="numeric"
            figures
            error={errorOf('count')}
          />
        </>
      )}
      <DashPhoto jobId={jobId} hash={draft.photo} onTaken={(photo) => change({ photo })} />
      <DraftSign kept={kept} />
      <NotSaved problem={notSaved} />
      <Key kind="main" type="submit" disabled={saving}>
        {draft.format === 'unreadable' ? 'Record: cannot be read' : 'Take it down'}
      </Key>
    </form>
  )
}

function bodyOf(draft: CodeDraft, order: number): Result<LogBody, CodeProblem> {
  if (draft.format === 'unreadable') {
    const reason = draft.reason.trim()
    return reason === ''
      ? fail({ field: 'reason', words: 'Say why, in a few words.' })
      : ok({ kind: 'codesUnreadable', reason })
  }
  const seen = seenOf(draft)
  if (!seen.ok) {
    return seen
  }
  const context = contextOf(draft, order)
  return context.ok ? ok({ kind: 'code', seen: seen.value, context: context.value }) : context
}

function Boxes(props: {
  draft: CodeDraft
  change: (next: Partial<CodeDraft>) => void
  errorOf: (field: keyof CodeDraft) => string | null
}) {
  const { draft, change, errorOf } = props
  const box = (
    field: 'module' | 'spn' | 'fmi' | 'pcode' | 'flash' | 'flashAgain' | 'text' | 'reason',
    label: string,
    more: { hint?: string; numeric?: boolean; words?: boolean } = {},
  ) => (
    <Field
      label={label}
      {...(more.hint === undefined ? {} : { hint: more.hint })}
      value={draft[field]}
      onChange={(text) => change({ [field]: text })}
      inputMode={more.numeric ? 'numeric' : 'text'}
      autoCapitalize={more.words ? 'sentences' : 'characters'}
      figures={!more.words}
      maxLength={more.words ? 500 : 80}
      error={errorOf(field)}
    />
  )
  switch (draft.format) {
    case 'spn':
      return (
        <div className="grid grid-cols-1 items-end gap-3 roomy:grid-cols-3">
          {box('module', 'Module', { numeric: true })}
          {box('spn', 'SPN', { numeric: true })}
          {box('fmi', 'FMI', { numeric: true })}
        </div>
      )
    case 'pcode':
      return box('pcode', 'Code')
    case 'flash':
      return (
        <>
          {box('flash', 'Flashes', { hint: 'Two long, four short: 2-4.', numeric: false })}
          {box('flashAgain', 'Once more, from its next repeat')}
        </>
      )
    case 'asShown':
      return box('text', 'As shown')
    case 'unreadable':
      return box('reason', 'Why can it not be read?', { words: true })
  }
}
