'use client'

import { useEffect } from 'react'

/** After a refused save: moves the focus to the first box that is wrong, so that its sentence is read out. */
export function useFocusInvalid(problem: unknown): void {
  useEffect(() => {
    if (problem !== null) {
      document
        .querySelector<HTMLElement>('[aria-invalid="true"], [data-invalid="true"] input')
        ?.focus()
    }
  }, [problem])
}
