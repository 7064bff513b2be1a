'use client'

import { useState } from 'react'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { browserFileLine, type FileLine } from '@/lib/ports/file-line'
import type { ImportAnswer } from '@/lib/sync/protocol/unsent-file'
import { clockTime, dayOf, size } from '../../field/times'
import { useDesk } from '../desk-context'
import { askAbout, type FileShown } from './ask-about'
import { ImportList } from './import-list'
import { summaryOf } from './import-words'

/** What may not write any more goes to the owner instead of into a job (IM4). */
const ASIDE = {
  deviceRevoked:
    'The phone that made it was taken out. Nothing in it touches a job before the owner accepts it, under Phones.',
  membershipEnded:
    'The person whose work it is left the shop. Nothing in it touches a job before the owner accepts it, under Phones.',
} as const

/** Takes in the file of a phone that could not send: choose it, look at what is in it, take it in. */
export function ImportDesk({ line = browserFileLine }: { line?: FileLine }) {
  const file = useFile(line)
  return (
    <main
      id="desk-main"
      tabIndex={-1}
      className="desk-page grid max-w-180 grid-cols-[minmax(0,1fr)] gap-4"
    >
      <h1 className="caps text-figure">Take in a phone’s file</h1>
      <p>
        A phone that cannot send makes a file of its unsent work: on the phone, open the list of
        unsent work and press Hand over by file. What the shop has already is not taken twice.
      </p>
      <label className="key relative w-full">
        {file.name === null ? 'Choose the file' : 'Choose another file'}
        <input
          type="file"
          accept="application/json,.json"
          disabled={file.busy}
          className="absolute inset-0 cursor-pointer opacity-0"
          onChange={(event) => {
            const chosen = event.target.files?.[0]
            if (chosen) file.choose(chosen)
            // Else the same file, chosen once more, would be no change.
            event.target.value = ''
          }}
        />
      </label>
      {file.name === null ? null : (
        <p className="min-w-0 break-words">
          Chosen: <b>{file.name}</b>
        </p>
      )}
      <p role="alert" className="font-bold text-nogo empty:hidden">
        {file.refusal}
      </p>
      {file.refusal === null ? null : (
        <Key disabled={file.busy} onClick={file.look}>
          Look again
        </Key>
      )}
      {file.list === null ? null : <Found list={file.list} busy={file.busy} take={file.take} />}
    </main>
  )
}

function Found({ list, busy, take }: { list: ImportAnswer; busy: boolean; take: () => unknown }) {
  const { shop } = useDesk()
  const bytes = list.photos.reduce((sum, photo) => sum + photo.bytes, 0)
  return (
    <section className="grid gap-3">
      <RuleEdge>{list.applied ? 'Done' : 'In the file'}</RuleEdge>
      <p>
        From <b>{list.person.name ?? 'a person without a name here'}</b>, made{' '}
        {dayOf(list.madeAt, shop.zone)} at{' '}
        <b className="figures">{clockTime(list.madeAt, shop.zone)}</b>
        {bytes > 0 ? `, with ${size(bytes)} of photos and voice notes` : ''}.
      </p>
      {list.quarantine === null ? null : <p>{ASIDE[list.quarantine]}</p>}
      <p role="status" className="text-row font-bold">
        {summaryOf(list)}
      </p>
      <ImportList list={list} zone={shop.zone} />
      {list.applied ? null : (
        <Key kind="main" disabled={busy} onClick={take}>
          {list.quarantine === null ? 'Take it in' : 'Set it aside'}
        </Key>
      )}
    </section>
  )
}

const NOTHING: FileShown = { list: null, refusal: null }

function useFile(line: FileLine) {
  const [file, setFile] = useState<File | null>(null)
  const [shown, setShown] = useState(NOTHING)
  const [busy, setBusy] = useState(false)
  const { list } = shown
  function ask(which: File, asked: { take: boolean; list: FileShown['list'] }) {
    setBusy(true)
    setShown({ list: asked.list, refusal: null })
    askAbout(line, which, asked)
      .then((next) => {
        setShown(next)
        if (next.refusal === null && next.list !== null) announce(summaryOf(next.list))
      })
      .catch(() => setShown({ list: asked.list, refusal: 'That did not work. Look again.' }))
      .finally(() => setBusy(false))
  }
  return {
    ...shown,
    busy,
    name: file?.name ?? null,
    choose(chosen: File) {
      setFile(chosen)
      ask(chosen, { take: false, list: null })
    },
    look: () => file !== null && ask(file, { take: false, list }),
    take: () => file !== null && ask(file, { take: true, list }),
  }
}
