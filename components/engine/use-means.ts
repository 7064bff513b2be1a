'use client'
import { useEffect, useMemo, useState } from 'react'
import { sunTimes } from '@/lib/diag/daylight'
import { isDark } from '@/lib/diag/light'
import type { Means } from '@/lib/diag/plan'
import type { Id } from '@/lib/model/id'
import type { Place } from '@/lib/model/place'
import type { Instant } from '@/lib/model/time'
import { usePorts } from '../store/store-provider'
import { useDraft } from '../store/use-draft'
import { useBag, useJob, useShop } from '../store/use-rows'
import { useSession } from '../store/use-session'
import { minutesTo } from './leave-by'

/** What the person says about the plan of one job; kept on the phone, changed at any time. */
type MeansChoice = {
  /** When to leave by; null: no limit (rule R6 leaves it to the person). */
  leaveBy: Instant | null
  dark: 'bySun' | 'yes' | 'no'
  people: 1 | 2
}
const FIRST: MeansChoice = { leaveBy: null, dark: 'bySun', people: 1 }
const MINUTE_MS = 60_000

export type MeansView = {
  means: Means | null
  choice: MeansChoice
  choose(next: MeansChoice): void
  /** Civil dusk at the job's place today, as an instant in ms; null without a place or where it never gets dark. */
  duskMs: number | null
  darkBySun: boolean
  /** The present minute, ms. */
  nowMs: number
}

/** What the plan may count on: bag, roles, time, light, people, and the shop's prices. */
export function useMeans(jobId: Id): MeansView {
  const job = useJob(jobId)
  const bag = useBag()
  const shop = useShop()
  const session = useSession()
  const { value: choice, set } = useDraft<MeansChoice>(`plan:${jobId}`, FIRST)
  const now = useMinute()
  const sun = useMemo(() => sunAt(job?.place ?? null, now), [job?.place, now])
  const minutesLeft = choice.leaveBy === null ? null : minutesTo(choice.leaveBy, now)
  const dark = choice.dark === 'bySun' ? sun.dark : choice.dark === 'yes'
  const airTempC = job?.airTempC ?? null
  const means = useMemo<Means | null>(() => {
    if (shop === undefined || bag === undefined || session.kind !== 'ready') return null
    const { perMinuteMinor, towMinor, recoveryMinor } = shop
    return {
      bag,
      roles: session.actor.roles,
      minutesToLeaveBy: minutesLeft,
      shop: { perMinuteMinor, towMinor, recoveryMinor },
      dark,
      people: choice.people,
      airTempC,
    }
  }, [shop, bag, session, minutesLeft, dark, choice.people, airTempC])
  return { means, choice, choose: set, duskMs: sun.duskMs, darkBySun: sun.dark, nowMs: now }
}

/** The present minute by the phone's clock, in ms; changes once a minute. */
function useMinute(): number {
  const { clock } = usePorts()
  const [minute, setMinute] = useState(() => Math.floor(clock.now() / MINUTE_MS))
  useEffect(() => {
    const timer = setInterval(() => setMinute(Math.floor(clock.now() / MINUTE_MS)), 5000)
    return () => clearInterval(timer)
  }, [clock])
  return minute * MINUTE_MS
}

function sunAt(place: Place | null, nowMs: number): { dark: boolean; duskMs: number | null } {
  if (place === null) return { dark: false, duskMs: null }
  const { civilDusk } = sunTimes(place.latitude, place.longitude, nowMs)
  return { dark: isDark(place, nowMs), duskMs: civilDusk }
}
