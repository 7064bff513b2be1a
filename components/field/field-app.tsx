'use client'

import { FieldRouter } from './router'

/** The field app: everything under /field. */
export function FieldApp() {
  return (
    <FieldRouter>
      <p>Opening what this phone holds.</p>
    </FieldRouter>
  )
}
