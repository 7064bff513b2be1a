'use client'

import { type ReactNode, useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { useFocusInvalid } from '@/components/ui/use-focus-invalid'
import type { OpInput } from '@/lib/sync/protocol/op'
import { jobHref } from '../route'
import { useRoute } from '../router'

/** Why a value cannot be recorded, and which box it stands in; null when it is of no box. */
export type Refusal = { field: string | null; words: string }
/** The sentence for a box whose value was refused; null for every other one. */
export type ErrorOf = (field: string) => string | null

type Props = {
  jobId: string
  title: string
  second?: string
  saveWords: string
  /** False while the draft is being opened. */
  ready: boolean
  draftKey: string
  /** What is to be recorded, nothing when nothing changed, or why it cannot be. */
  read: () => OpInput[] | Refusal
  children: (errorOf: ErrorOf) => ReactNode
}

/** A small screen that changes one thing of a job, saves it on the phone and goes back to the job. */
export function SettingScreen(props: Props) {
  const { jobId, read, draftKey } = props
  const { save, saving, problem } = useSave()
  // How often it was refused: each time the box that is wrong takes the focus; the sentence goes once it is right.
  const [refused, setRefused] = useState<number | null>(null)
  useFocusInvalid(refused)
  const refusal = refused === null ? null : refusalOf(read())
  const { go, here } = useRoute()
  const press = async () => {
    const ops = read()
    if (!Array.isArray(ops)) {
      setRefused((times) => (times ?? 0) + 1)
      announce(ops.words, 'assertive')
      return
    }
    if (!(await save(ops, { clearDrafts: [draftKey] }))) return
    announce(ops.length === 0 ? 'Nothing changed.' : 'Saved on this phone.')
    go(jobHref(jobId), { replace: true, from: here })
  }
  return (
    <Screen
      title={props.title}
      second={props.second}
      foot={
        <>
          {refusal === null || refusal.field !== null ? null : (
            <p className="font-bold text-nogo">{refusal.words}</p>
          )}
          <NotSaved problem={problem} />
          <Key kind="main" disabled={!props.ready || saving} onClick={() => void press()}>
            {props.saveWords}
          </Key>
        </>
      }
    >
      {props.children((field) => (refusal?.field === field ? refusal.words : null))}
    </Screen>
  )
}

const refusalOf = (read: OpInput[] | Refusal): Refusal | null => (Array.isArray(read) ? null : read)
