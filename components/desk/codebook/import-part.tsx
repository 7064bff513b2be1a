'use client'

import { useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { announce } from '@/components/ui/announce'
import { ChoiceMany } from '@/components/ui/choice'
import { Field } from '@/components/ui/field'
import { type BookImported, bookImported } from '@/lib/model/book-desk'
import { browserFileLine, type FileLine } from '@/lib/ports/file-line'
import { reads } from '../live/stale-reads'
import { findingLine, problemLines } from './book-words'
import { Lines } from './lines'

const SENTENCES: Record<string, string> = {
  noConnection: 'No connection to the shop. Nothing was taken in.',
  notAsItStands:
    'There is a draft already. Choose to put this one in its place, then the file again.',
  tooLarge: 'The file is too large.',
  signIn: 'You are signed out. Sign in again, then choose the file again.',
}

/** Takes a file as the draft: one JSON file, or CSV files chosen together. */
export function ImportPart({
  hasDraft,
  line = browserFileLine,
}: {
  hasDraft: boolean
  line?: FileLine
}) {
  const client = useQueryClient()
  const [note, setNote] = useState('')
  const [replace, setReplace] = useState(false)
  const [busy, setBusy] = useState(false)
  const [refusal, setRefusal] = useState<string | null>(null)
  const [done, setDone] = useState<BookImported | null>(null)
  const take = async (chosen: FileList) => {
    setBusy(true)
    const files = await Promise.all(
      [...chosen].map(async (file) => ({ name: file.name, text: await file.text() })),
    )
    const words = note.trim() === '' ? null : note.trim()
    const body = JSON.stringify({ files, note: words, replace })
    const answer = await line.post('/api/desk/codebook/import', new Blob([body]))
    const read = answer.ok ? bookImported.safeParse(answer.value) : null
    const refused = answer.ok
      ? null
      : (SENTENCES[answer.problem.kind] ?? answer.problem.title ?? 'Nothing was taken in.')
    setRefusal(refused)
    setDone(read?.success ? read.data : null)
    if (read?.success) announce(saidOf(read.data))
    setBusy(false)
    await client.invalidateQueries({ queryKey: reads.books })
  }
  return (
    <section aria-label="Take in a file" className="grid max-w-160 gap-3">
      <Field label="Note for the draft" value={note} onChange={setNote} maxLength={500} />
      {hasDraft ? (
        <ChoiceMany
          legend="Draft"
          legendHidden={true}
          options={[{ value: 'replace', label: 'Put it in place of the draft' }]}
          value={replace ? ['replace'] : []}
          onChange={(next) => setReplace(next.length > 0)}
        />
      ) : null}
      <label className="key relative w-full">
        Take in a file
        <input
          type="file"
          multiple
          accept=".json,.csv,application/json,text/csv"
          disabled={busy}
          className="absolute inset-0 cursor-pointer opacity-0"
          onChange={(event) => {
            const { files } = event.target
            if (files !== null && files.length > 0) {
              take(files)
                .catch(() => setRefusal('That did not work. Choose the file again.'))
                .finally(() => setBusy(false))
            }
          }}
        />
      </label>
      <p role="alert" className="font-bold text-nogo empty:hidden">
        {refusal}
      </p>
      {done === null ? null : (
        <>
          <p role="status" className="text-row font-bold">
            {saidOf(done)}
          </p>
          <Lines title="Wrong in the file" lines={problemLines(done)} />
          <Lines title="Findings" lines={done.findings.map(findingLine)} />
        </>
      )}
    </section>
  )
}

function saidOf({ taken, findings }: BookImported): string {
  if (taken === null) return 'Nothing was taken in.'
  const items = `A draft of ${taken.items} items.`
  return findings.length === 0
    ? `${items} Nothing hinders its publishing.`
    : `${items} ${findings.length} findings hinder its publishing.`
}
