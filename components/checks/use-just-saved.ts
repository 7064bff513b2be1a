'use client'
import { useState } from 'react'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'

/** The entry this screen has just recorded, until it is taken back or left. */
export function useJustSaved(entries: readonly LogEntry[]) {
  const [savedId, setSavedId] = useState<Id | null>(null)
  const there = savedId !== null && entries.some((entry) => entry.id === savedId)
  return {
    savedId: there ? savedId : null,
    keepSaved: setSavedId,
    forget: () => setSavedId(null),
  }
}
