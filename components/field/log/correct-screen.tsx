'use client'

import { useState } from 'react'
import { entryWords } from '@/components/log/entry-words'
import { useBook } from '@/components/store/use-book'
import { useDraft } from '@/components/store/use-draft'
import { useLog } from '@/components/store/use-log'
import { useRecord } from '@/components/store/use-record'
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
  const record = useRecord()
  const stamp = useStamp()
  const { go, here } = useRoute()
  const entry = log?.find((line) => line.entry.id === entryId)?.entry
  const words = entry && entryWords(entry.body, index)
  const save = () => {
    if (reason.trim() === '') {
      setProblem('Say what was wrong with it.')
      return
    }
    record(
      [stamp.entry(jobId, { kind: 'correction', reason: reason.trim() }, { supersedes: entryId })],
      { clearDrafts: [key] },
    )
      .then(() => {
        announce('Correction saved on this phone.')
        go(jobHref(jobId, 'log'), { replace: true, from: here })
      })
      .catch(() => setProblem('Could not be saved. Nothing typed is lost: try again.'))
  }
  return (
    <Screen
      title="Correct an entry"
      second="The entry stays in the log, struck through. It no longer counts as evidence."
      kept={kept}
      foot={
        <Key kind="main" disabled={!ready || entry === undefined} onClick={save}>
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
    </Screen>
  )
}
