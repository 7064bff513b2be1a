'use client'
import { useEffect, useState } from 'react'
import type { Id } from '@/lib/model/id'
import type { OpInput } from '@/lib/sync/protocol/op'
import { usePorts } from '../store/store-provider'
import { useStamp } from '../store/use-stamp'
import { announce } from '../ui/announce'
import { Key } from '../ui/key'
import { NotSaved, useSave } from './use-save'

const UNDO_SECONDS = 10

type Props = {
  jobId: Id
  /** The entry just recorded. */
  entryId: Id
  what: string
  /** What goes back with it, asked at the moment it is taken back. */
  alsoBack?: () => OpInput[]
  onUndone: () => void
}

/**
 * Ten seconds to take an outcome back (rule R8). Choice: the outcome is kept at once, so that a dead
 * phone loses nothing; taking it back adds a correction that points to it, as later corrections do.
 */
export function UndoBar({ jobId, entryId, what, alsoBack, onUndone }: Props) {
  const left = useSecondsLeft()
  const stamp = useStamp()
  const { save, saving, problem } = useSave()
  const undo = async () => {
    const body = { kind: 'correction', reason: 'Taken back within 10 seconds' } as const
    const back = stamp.entry(jobId, body, { supersedes: entryId })
    if (!(await save([back, ...(alsoBack?.() ?? [])]))) return
    announce(`${what} taken back.`)
    onUndone()
  }
  return (
    <div className="flex items-center justify-between gap-3 border-y-2 border-ink py-2">
      <div className="min-w-0 flex-1">
        <b>{what}</b>
        <span className="block text-second text-ink2">
          {left > 0 ? 'saved on this phone' : 'saved; from now on a correction in the log'}
        </span>
        <NotSaved problem={problem} />
      </div>
      {left > 0 && (
        <Key small disabled={saving} onClick={undo}>
          Undo <span className="figures">{left}</span>
        </Key>
      )}
    </div>
  )
}

/** Whole seconds left since the bar was first shown; give the bar the entry's id as its key. */
function useSecondsLeft(): number {
  const { clock } = usePorts()
  const [left, setLeft] = useState(UNDO_SECONDS)
  useEffect(() => {
    const start = clock.now()
    setLeft(UNDO_SECONDS)
    const timer = setInterval(() => {
      const passed = Math.floor((clock.now() - start) / 1000)
      setLeft(Math.max(0, UNDO_SECONDS - passed))
      if (passed >= UNDO_SECONDS) clearInterval(timer)
    }, 250)
    return () => clearInterval(timer)
  }, [clock])
  return left
}
