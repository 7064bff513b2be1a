import type { ComponentProps, ReactNode } from 'react'
import { classes } from './class-names'

type KeyKind = 'main' | 'plain' | 'plate'

const LOOK: Record<KeyKind, string> = { main: 'key-main', plain: '', plate: 'key-plate' }

type Looks = {
  /** `main`: the one thing to do, full width, 72 px. `plate`: blue, 64 px. `plain`: the rest. */
  kind?: KeyKind
  /** 56 px high, for a key beside or inside text. */
  small?: boolean
  /** Words in the text face, not in capitals: for keys that are sentences. */
  quiet?: boolean
  children: ReactNode
}

/** A key that does something. Disabled keys stay readable: give the reason beside them. */
export function Key({
  kind = 'plain',
  small,
  quiet,
  className,
  type = 'button',
  ...rest
}: Looks & ComponentProps<'button'>) {
  return (
    <button
      type={type}
      className={classes('key', LOOK[kind], small && 'key-small', quiet && 'key-quiet', className)}
      {...rest}
    />
  )
}

/** The same key, going to another screen. */
export function KeyLink({
  kind = 'plain',
  small,
  quiet,
  className,
  children,
  ...rest
}: Looks & ComponentProps<'a'>) {
  return (
    <a
      className={classes('key', LOOK[kind], small && 'key-small', quiet && 'key-quiet', className)}
      {...rest}
    >
      {children}
    </a>
  )
}
