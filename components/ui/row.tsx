import type { ReactNode } from 'react'
import { classes } from './class-names'

type Props = {
  title: ReactNode
  second?: ReactNode
  icon?: ReactNode
  /** Right column: a figure or a word, and a smaller one under it. */
  end?: ReactNode
  endSecond?: ReactNode
  href?: string
  onPress?: () => void
  struck?: boolean
  className?: string
}

/** One line of a list, 68 px, with a rule under it. Put it in an `<li>`. */
export function Row(props: Props) {
  const look = classes(
    'flex min-h-row w-full items-center gap-3 border-b-[1.5px] border-rule py-2 text-left text-ink no-underline',
    props.className,
  )
  if (props.href !== undefined) {
    return (
      <a href={props.href} className={look}>
        <Inside {...props} />
      </a>
    )
  }
  if (props.onPress) {
    return (
      <button type="button" onClick={props.onPress} className={look}>
        <Inside {...props} />
      </button>
    )
  }
  return (
    <div className={look}>
      <Inside {...props} />
    </div>
  )
}

function Inside({ title, second, icon, end, endSecond, struck, href, onPress }: Props) {
  const goes = href !== undefined || onPress !== undefined
  return (
    <>
      {icon ? <span className="shrink-0">{icon}</span> : null}
      <span className="min-w-0 flex-1">
        <span className={classes('block text-row font-bold', struck && 'line-through')}>
          {title}
        </span>
        {second ? <span className="block text-second text-ink2">{second}</span> : null}
      </span>
      {end || endSecond ? (
        <span className="shrink-0 text-right">
          <span className="figures block text-body">{end}</span>
          {endSecond ? (
            <span className="figures block text-second text-ink2">{endSecond}</span>
          ) : null}
        </span>
      ) : null}
      {goes ? <Arrow /> : null}
    </>
  )
}

function Arrow() {
  return (
    <svg viewBox="0 0 12 24" className="h-6 w-3 shrink-0" fill="none" aria-hidden="true">
      <path d="M2 4 10 12 2 20" stroke="currentColor" strokeWidth="2.6" />
    </svg>
  )
}
