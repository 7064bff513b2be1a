'use client'

import { useLost } from '@/components/store/use-lost'
import { Key } from '@/components/ui/key'
import { counted } from '../words'

/** Says once that an emptied store took unsent work with it, how much and from when (P22). */
export function LostNotice() {
  const { lost, read } = useLost()
  if (lost === null) {
    return null
  }
  return (
    <section
      role="alert"
      aria-label="Work was lost"
      className="safe-sides grid gap-2 border-y-2 border-nogo py-3"
    >
      <p className="font-bold text-nogo">
        Work was lost on this phone: {counted(lost.ops, 'record')}
        {lost.lastOn === null ? '' : `, last kept on ${dayWords(lost.lastOn)}`}.
      </p>
      <p>
        The browser cleared the store before the shop had them. Write them again from paper or
        memory while you still can, and tell the shop. To keep it from happening, put the app on the
        home screen and send whenever there is signal.
      </p>
      <div>
        <Key small onClick={read}>
          I have read it
        </Key>
      </div>
    </section>
  )
}

/** "Tue 24 Nov 2026" of `2026-11-24`. */
function dayWords(day: string): string {
  const parts = { weekday: 'short', day: 'numeric', month: 'short', year: 'numeric' } as const
  return new Intl.DateTimeFormat('en-GB', { ...parts, timeZone: 'UTC' })
    .format(new Date(`${day}T00:00:00Z`))
    .replace(',', '')
}
