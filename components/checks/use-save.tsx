'use client'
import { useCallback, useState } from 'react'
import { AppError } from '@/lib/model/result'
import type { OpInput } from '@/lib/sync/protocol/op'
import { isNoRoom, NO_ROOM } from '../field/log/no-room'
import { type NewPhoto, useRecord } from '../store/use-record'
import { announce } from '../ui/announce'
import { oneAtATime } from './one-at-a-time'

type More = {
  photos?: NewPhoto[]
  clearDrafts?: string[]
  /** Kept instead when the phone has no room for the photos (P21). */
  wordsAlone?: OpInput[]
}
export type Save = {
  /** True when it is on the phone; false when it is not, and then `problem` says why; a second tap is none. */
  save: (ops: OpInput[], more?: More) => Promise<boolean>
  saving: boolean
  problem: string | null
}

/** Records what a person did, once however often it is tapped, and says plainly what the phone did not keep. */
export function useSave(): Save {
  const record = useRecord()
  const [saving, setSaving] = useState(false)
  const [once] = useState(() => oneAtATime(false))
  const [problem, setProblem] = useState<string | null>(null)
  const keepWords = useCallback(
    async (error: unknown, ops: OpInput[], { clearDrafts = [] }: More) => {
      if (!isNoRoom(error) || ops.length === 0) return null
      const isKept = await record(ops, { clearDrafts }).then(
        () => true,
        () => false,
      )
      return isKept ? `${NO_ROOM} The words are kept as a note.` : null
    },
    [record],
  )
  const save = useCallback(
    (ops: OpInput[], { wordsAlone = [], ...more }: More = {}) =>
      once(async () => {
        setSaving(true)
        try {
          await record(ops, more)
          setProblem(null)
          return true
        } catch (error) {
          const words = (await keepWords(error, wordsAlone, more)) ?? whyNotSaved(error)
          setProblem(words)
          announce(words, 'assertive')
          return false
        } finally {
          setSaving(false)
        }
      }),
    [keepWords, record, once],
  )
  return { save, saving, problem }
}

/** Sentences by what went wrong; what was typed is still there in every case. */
function whyNotSaved(error: unknown): string {
  const kind = error instanceof AppError ? error.kind : 'unknown'
  const words: Record<string, string> = {
    noRoomForPhoto: NO_ROOM,
    storeFull: 'Not saved: this phone has no room left. What you typed is still here.',
    recordTooBig: 'Not saved: this is too long for one entry. Make the words shorter.',
    badRecord: 'Not saved: the entry is not in order. What you typed is still here.',
    notAllowed: 'Not saved: your roles in this shop do not allow this.',
    nobodyAtWork: 'Not saved: nobody is signed in on this phone.',
  }
  return words[kind] ?? 'Not saved. Try once more; what you typed is still here.'
}

/** The sentence of a failed save, beside the key that failed. */
export function NotSaved({ problem }: { problem: string | null }) {
  return problem === null ? null : <p className="font-bold text-(--verdict-nogo)">{problem}</p>
}
