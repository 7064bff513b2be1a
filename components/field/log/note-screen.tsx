'use client'

import { useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { useDraft } from '@/components/store/use-draft'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { useFocusInvalid } from '@/components/ui/use-focus-invalid'
import { OfJob } from '../of-job'
import { jobHref } from '../route'
import { useRoute } from '../router'
import { usePatch } from '../use-patch'
import { happenedAbout } from './happened-about'

type NoteDraft = { words: string; about: string }
const EMPTY: NoteDraft = { words: '', about: '' }

/** A note, kept to the keystroke; when it happened may be typed, "about 11:30". */
export function NoteScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{({ job }) => <Note jobId={job.id} zone={job.zone} />}</OfJob>
}

function Note({ jobId, zone }: { jobId: string; zone: string }) {
  const key = `job.${jobId}.note`
  const { value: draft, set, ready, kept } = useDraft<NoteDraft>(key, EMPTY)
  const [problem, setProblem] = useState<{ field: keyof NoteDraft; words: string } | null>(null)
  useFocusInvalid(problem)
  const { save, saving, problem: notSaved } = useSave()
  const stamp = useStamp()
  const { go, here } = useRoute()
  const patch = usePatch(draft, set)
  const change = (next: Partial<NoteDraft>) => {
    setProblem(null)
    patch(next)
  }
  const keep = async () => {
    const words = draft.words.trim()
    const about = happenedAbout(draft.about, stamp.now(), zone)
    if (words === '') {
      setProblem({ field: 'words', words: 'Write something first.' })
    } else if (about === null) {
      setProblem({ field: 'about', words: 'A time of the last 24 hours, like 11:30, or nothing.' })
    } else {
      const note = stamp.entry(jobId, { kind: 'note', words }, { happenedAt: about })
      if (!(await save([note], { clearDrafts: [key] }))) return
      announce('Note saved on this phone.')
      go(jobHref(jobId, 'log'), { replace: true, from: here })
    }
  }
  return (
    <Screen
      title="Note"
      kept={kept}
      foot={
        <Key kind="main" disabled={!ready || saving} onClick={keep}>
          Save note
        </Key>
      }
    >
      <Field
        label="What is it?"
        value={draft.words}
        onChange={(words) => change({ words })}
        lines={6}
        maxLength={2000}
        autoCapitalize="sentences"
        error={problem?.field === 'words' ? problem.words : null}
      />
      <Field
        label="Happened about"
        hint="Leave it empty for now."
        value={draft.about}
        onChange={(about) => change({ about: about.slice(0, 5) })}
        inputMode="text"
        placeholder="11:30"
        figures
        error={problem?.field === 'about' ? problem.words : null}
      />
      <NotSaved problem={notSaved} />
    </Screen>
  )
}
