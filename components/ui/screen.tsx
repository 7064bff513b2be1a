'use client'

import type { ReactNode } from 'react'
import type { DraftKept } from '@/lib/sync/client/drafts'
import { classes } from './class-names'
import { DraftSign } from './draft-sign'
import { useTitle } from './title-focus'

type Props = {
  title: ReactNode
  /** One sentence under the title. */
  second?: ReactNode
  /** Whether what is half written here is kept. */
  kept?: DraftKept
  children: ReactNode
  /** The keys of the screen: they stay at the thumb, above the tabs. */
  foot?: ReactNode
  /** The title is read out but not drawn, where the screen begins with its own large figure. */
  titleHidden?: boolean
}

/** One field screen: title, content, and its keys at the bottom. The title takes the focus when it opens. */
export function Screen({ title, second, kept, children, foot, titleHidden = false }: Props) {
  const heading = useTitle()
  return (
    <div className="flex flex-1 flex-col">
      <div className="safe-sides grid flex-1 grid-cols-[minmax(0,1fr)] content-start gap-5 pt-1 pb-6">
        <div className={classes(titleHidden && 'visually-hidden')}>
          <h1 ref={heading} id="screen-title" tabIndex={-1} className="caps text-screen">
            {title}
          </h1>
          {second ? <p className="mt-1 text-second text-ink2">{second}</p> : null}
          {kept === undefined ? null : <DraftSign kept={kept} />}
        </div>
        {children}
      </div>
      {foot ? (
        <div className="screen-foot no-print safe-sides grid gap-2 bg-ground py-2">{foot}</div>
      ) : null}
    </div>
  )
}
