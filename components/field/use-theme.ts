'use client'

import { useCallback, useMemo } from 'react'
import { usePorts } from '@/components/store/store-provider'
import { useJobs } from '@/components/store/use-rows'
import type { Place } from '@/lib/model/place'
import { useThemeAt } from './theme-choice'

/** Keeps the document in the theme that was chosen, by the sun at the last known place when on auto. */
export function useThemeByTheSun(): void {
  const { clock } = usePorts()
  const now = useCallback(() => clock.now(), [clock])
  useThemeAt(useLastPlace(), now)
}

/** The place of the newest job that has one. */
export function useLastPlace(): Place | null {
  const jobs = useJobs()
  return useMemo(() => jobs?.find((job) => job.place !== null)?.place ?? null, [jobs])
}
