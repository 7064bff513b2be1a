'use client'

import { usePathname } from 'next/navigation'
import { useEffect, useRef, useState } from 'react'
import { may } from '@/lib/shop/permissions'
import { rolesInWords } from '@/lib/shop/role-words'
import { SignOutKey } from '../sign-in/sign-out-key'
import { useDesk } from './desk-context'
import { deskPaths } from './desk-path'
import { LineState } from './line-state'
import { ThemePick } from './theme-pick'

/** Shop, sections, how the line is, and who sits here. */
export function DeskHeader() {
  const { actor, shop } = useDesk()
  const path = usePathname()
  const onJobs = path === deskPaths.board || path.startsWith('/desk/jobs/')
  return (
    <header className="desk-header">
      <a href="#desk-main" className="desk-skip">
        To the work
      </a>
      <p className="desk-shop">
        <span className="caps text-screen">Farbench</span>
        <span className="truncate text-second font-bold">{shop.name}</span>
      </p>
      <nav aria-label="Desk" className="desk-sections">
        <a href={deskPaths.board} aria-current={onJobs ? 'page' : undefined}>
          Jobs
        </a>
        {may(actor.roles, 'part.see') ? (
          <a href={deskPaths.parts} aria-current={path === deskPaths.parts ? 'page' : undefined}>
            Parts
          </a>
        ) : null}
        {may(actor.roles, 'unsent.import') ? (
          <a
            href={deskPaths.handOver}
            aria-current={path === deskPaths.handOver ? 'page' : undefined}
          >
            Take in
          </a>
        ) : null}
        {may(actor.roles, 'device.revoke') ? (
          <a href={deskPaths.phones} aria-current={path === deskPaths.phones ? 'page' : undefined}>
            Phones
          </a>
        ) : null}
        {may(actor.roles, 'book.publish') ? (
          <a href={deskPaths.book} aria-current={path === deskPaths.book ? 'page' : undefined}>
            Code book
          </a>
        ) : null}
        {may(actor.roles, 'field.see') ? <a href="/field">Field</a> : null}
      </nav>
      <LineState />
      <PersonMenu />
    </header>
  )
}

/** Name and roles; opens to the choice of light and the sign-out key. Escape closes it. */
function PersonMenu() {
  const { actor } = useDesk()
  const [open, setOpen] = useState(false)
  const key = useRef<HTMLButtonElement>(null)
  useEffect(() => {
    if (!open) return
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return
      setOpen(false)
      key.current?.focus()
    }
    document.addEventListener('keydown', onKey)
    return () => document.removeEventListener('keydown', onKey)
  }, [open])
  return (
    <div className="desk-person">
      <button
        ref={key}
        type="button"
        aria-expanded={open}
        aria-controls="desk-menu"
        onClick={() => setOpen(!open)}
        className="desk-person-key"
      >
        <span className="block font-bold">{actor.name ?? 'Name erased'}</span>
        <span className="block text-second text-ink2">{rolesInWords(actor.roles)}</span>
      </button>
      <div id="desk-menu" className="desk-menu" hidden={!open}>
        <ThemePick />
        <SignOutKey small={true} />
      </div>
    </div>
  )
}
