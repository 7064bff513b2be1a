'use client'

import { type ReactNode, useState } from 'react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import type { OpInput } from '@/lib/sync/protocol/op'
import { jobHref } from '../route'
import { useRoute } from '../router'

type Props = {
  jobId: string
  title: string
  second?: string
  saveWords: string
  /** False while the draft is being opened. */
  ready: boolean
  draftKey: string
  /** What is to be recorded, nothing when nothing changed, or why it cannot be. */
  read: () => OpInput[] | string
  children: ReactNode
}

/** A small screen that changes one thing of a job, saves it on the phone and goes back to the job. */
export function SettingScreen(props: Props) {
  const { jobId, read, draftKey } = props
  const { save, saving, problem } = useSave()
  const [refusal, setRefusal] = useState<string | null>(null)
  const { go, here } = useRoute()
  const press = async () => {
    const ops = read()
    setRefusal(typeof ops === 'string' ? ops : null)
    if (typeof ops === 'string') {
      announce(ops, 'assertive')
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
          {refusal === null ? null : <p className="font-bold text-nogo">{refusal}</p>}
          <NotSaved problem={problem} />
          <Key kind="main" disabled={!props.ready || saving} onClick={() => void press()}>
            {props.saveWords}
          </Key>
        </>
      }
    >
      {props.children}
    </Screen>
  )
}
