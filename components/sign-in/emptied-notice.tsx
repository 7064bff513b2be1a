'use client'

import { useEffect, useState } from 'react'
import { EMPTIED_WORDS } from './emptied-words'

/** Says that this phone was taken out and emptied, to whoever opens it next. */
export function EmptiedNotice() {
  const [emptied, setEmptied] = useState(false)
  useEffect(() => {
    let open = true
    import('@/lib/sync/client/emptied')
      .then((file) => file.readEmptied())
      .then(
        (found) => open && setEmptied(found),
        () => undefined,
      )
    return () => {
      open = false
    }
  }, [])
  if (!emptied) return null
  return (
    <p role="status" className="border-2 border-ink px-3 py-2 font-bold">
      {EMPTIED_WORDS}
    </p>
  )
}
