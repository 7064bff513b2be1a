import { classes } from './class-names'

type Props = {
  complaint: string
  /** Given by the shop; null while the job's opening is unsent. */
  number: string | null
  machine: string
  href?: string
  current?: boolean
  /** In a header: smaller, at most three lines. */
  compact?: boolean
  className?: string
}

/** The chamfered tag with the punched hole: complaint, job number, machine. Used for jobs only. */
export function JobTag({
  complaint,
  number,
  machine,
  href,
  current,
  compact = false,
  className,
}: Props) {
  const face = (
    <span className="tag-edge">
      <span className="tag-face">
        <Hole />
        <span className="min-w-0 flex-1">
          <span
            className={classes(
              'caps line-clamp-2 leading-[1.05]',
              compact ? 'text-section' : 'text-[1.625rem]',
            )}
          >
            {complaint}
          </span>
          <span
            className={classes(
              'text-second leading-tight text-ink2',
              compact ? 'block truncate' : 'block',
            )}
          >
            <span className="figures mr-2">{number ?? 'unsent'}</span>
            {machine}
          </span>
        </span>
      </span>
    </span>
  )
  if (href === undefined) {
    return <span className={classes('tag', className)}>{face}</span>
  }
  return (
    <a
      href={href}
      aria-current={current ? 'true' : undefined}
      className={classes('tag', className)}
    >
      {face}
    </a>
  )
}

function Hole() {
  return (
    <svg
      viewBox="0 0 30 30"
      className="hidden size-7.5 shrink-0 slim:block"
      fill="none"
      aria-hidden="true"
    >
      <circle cx="15" cy="15" r="12.6" stroke="var(--ink)" strokeWidth="2.2" />
      <circle cx="15" cy="15" r="6.4" fill="var(--ground)" stroke="var(--ink)" strokeWidth="2.6" />
    </svg>
  )
}
