import type { ReactNode } from 'react'

type Props = { backHref: string; backLabel: string; tag: ReactNode; witness: ReactNode }

/** Header of a task screen: Back, the job's tag, the witness mark. */
export function TaskHeader({ backHref, backLabel, tag, witness }: Props) {
  return (
    <div className="flex flex-wrap items-center justify-between gap-2">
      <a
        href={backHref}
        aria-label={`Back to ${backLabel}`}
        className="flex min-h-16 min-w-14 shrink-0 flex-col items-center justify-center font-bold text-ink no-underline"
      >
        <svg viewBox="0 0 24 24" className="size-6" fill="none" aria-hidden="true">
          <path d="M11 4 3 12 11 20M3 12H21" stroke="currentColor" strokeWidth="3" />
        </svg>
        <span className="text-second">Back</span>
      </a>
      <div className="order-last w-full min-w-0 slim:order-none slim:w-auto slim:flex-1">{tag}</div>
      {witness}
    </div>
  )
}
