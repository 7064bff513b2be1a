'use client'

import { useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { entryWords } from '@/components/log/entry-words'
import { useBook } from '@/components/store/use-book'
import { useDraft } from '@/components/store/use-draft'
import { useLog } from '@/components/store/use-log'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { useFocusInvalid } from '@/components/ui/use-focus-invalid'
import { jobHref } from '../route'
import { useRoute } from '../router'

/** A correction: the earlier entry stays, struck through, and counts no more. */
export function CorrectScreen({ jobId, entryId }: { jobId: string; entryId: string }) {
  const key = `job.${jobId}.correct.${entryId}`
  const { value: reason, set, ready, kept } = useDraft<string>(key, '')
  const [problem, setProblem] = useState<string | null>(null)
  const log = useLog(jobId)
  const { index } = useBook()
  useFocusInvalid(problem)
  const { save, saving, problem: notSaved } = useSave()
  const stamp = useStamp()
  const { go, here } = useRoute()
  const entry = log?.find((line) => line.entry.id === entryId)?.entry
  const words = entry && entryWords(entry.body, index)
  const keep = async () => {
    if (reason.trim() === '') {
      setProblem('Say what was wrong with it.')
      return
    }
    const body = { kind: 'correction', reason: reason.trim() } as const
    const correction = stamp.entry(jobId, body, { supersedes: entryId })
    if (!(await save([correction], { clearDrafts: [key] }))) return
    announce('Correction saved on this phone.')
    go(jobHref(jobId, 'log'), { replace: true, from: here })
  }
  return (
    <Screen
      title="Correct an entry"
      second="The entry stays in the log, struck through. It no longer counts as evidence."
      kept={kept}
      foot={
        <Key kind="main" disabled={!ready || saving || entry === undefined} onClick={keep}>
          Save correction
        </Key>
      }
    >
      {words === undefined ? (
        <p>This entry is not on this phone.</p>
      ) : (
        <p className="border-2 border-ink p-3 font-bold">
          {words.kind}: {words.title}
        </p>
      )}
      {entry?.body.kind === 'wayOut' ? (
        <p>
          The machine, the people and the job stay as they stand on the job. Change them there if
          that was wrong too.
        </p>
      ) : null}
      <Field
        label="What was wrong with it?"
        value={reason}
        onChange={(text) => {
          setProblem(null)
          set(text)
        }}
        lines={3}
        maxLength={2000}
        autoCapitalize="sentences"
        error={problem}
      />
      <NotSaved problem={notSaved} />
    </Screen>
  )
}
