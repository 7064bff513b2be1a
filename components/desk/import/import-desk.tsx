'use client'

import { useState } from 'react'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { browserFileLine, type FileLine, type FileRefusal } from '@/lib/ports/file-line'
import { type ImportAnswer, importAnswer } from '@/lib/sync/protocol/unsent-file'
import { clockTime, dayOf, size } from '../../field/times'
import { useDesk } from '../desk-context'
import { ImportList } from './import-list'
import { summaryOf } from './import-words'

const PATH = '/api/desk/import'
const TROUBLE: Record<string, string> = {
  noConnection: 'No connection to the shop. Nothing was taken.',
  serverTrouble: 'The shop’s server did not answer as it should. Look again in a moment.',
  signIn: 'You are signed out. Sign in again, then choose the file once more.',
}
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
      <label className="grid gap-2 font-bold">
        The file
        <input
          type="file"
          accept="application/json,.json"
          disabled={file.busy}
          className="min-h-14 w-full min-w-0 border-2 border-ink bg-well p-3"
          onChange={(event) => file.choose(event.target.files?.[0] ?? null)}
        />
      </label>
      <p role="alert" className="font-bold text-nogo empty:hidden">
        {file.refusal}
      </p>
      {file.list === null ? null : <Found list={file.list} busy={file.busy} take={file.take} />}
    </main>
  )
}

function Found({ list, busy, take }: { list: ImportAnswer; busy: boolean; take: () => void }) {
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

function useFile(line: FileLine) {
  const [file, setFile] = useState<File | null>(null)
  const [list, setList] = useState<ImportAnswer | null>(null)
  const [refusal, setRefusal] = useState<string | null>(null)
  const [busy, setBusy] = useState(false)
  async function send(which: File, path: string) {
    setBusy(true)
    const answer = await line.post(path, which)
    setBusy(false)
    const read = answer.ok ? importAnswer.safeParse(answer.value) : null
    setList(read?.data ?? null)
    const words = answer.ok
      ? read?.success === true
        ? null
        : TROUBLE.serverTrouble
      : sentence(answer.problem)
    setRefusal(words ?? null)
    if (read?.success === true) announce(summaryOf(read.data))
  }
  const failed = () => setRefusal('That did not work. Nothing is sure; look again in a moment.')
  return {
    list,
    refusal,
    busy,
    choose: (chosen: File | null) => {
      setFile(chosen)
      setList(null)
      setRefusal(null)
      if (chosen !== null) send(chosen, PATH).catch(failed)
    },
    take: () => {
      if (file !== null) send(file, `${PATH}?do=take`).catch(failed)
    },
  }
}

const sentence = ({ kind, title }: FileRefusal): string =>
  TROUBLE[kind] ?? title ?? 'The file was not taken.'
