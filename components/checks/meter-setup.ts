'use client'
import { useMemo } from 'react'
import { type MeterStands, meterAtHand } from '@/lib/diag/meter'
import type { Id } from '@/lib/model/id'
import type { MeterProfile, Quantity } from '@/lib/model/meter-profile'
import type { DraftKept } from '@/lib/sync/client/drafts'
import { useDraft } from '../store/use-draft'
import { useBag, useMeters } from '../store/use-rows'

/** How the meter stands for this job: kept on the phone between checks. */
export type MeterSetup = MeterStands & {
  meterId: Id | null
  /** The two temperatures as they stand in the field while they are no figure yet. */
  partTyped?: string | null
  meterTyped?: string | null
}
const FIRST: MeterSetup = { meterId: null, nulled: false, partTempC: null, meterTempC: null }

export type MeterView = {
  setup: MeterSetup
  change(next: MeterSetup): void
  meter: MeterProfile | null
  meters: readonly MeterProfile[]
  ready: boolean
  /** Whether the phone holds the set-up as it stands here. */
  kept: DraftKept
}

/** The meter in hand and how it is set up for this job; the one in the bag until another is picked. */
export function useMeterSetup(jobId: Id): MeterView {
  const meters = useMeters()
  const bag = useBag()
  const { value: setup, set, ready, kept } = useDraft<MeterSetup>(`meter:${jobId}`, FIRST)
  return useMemo(() => {
    const all = meters ?? []
    const picked = all.find((one) => one.id === setup.meterId) ?? meterAtHand(all, bag)
    return {
      setup,
      change: set,
      meter: picked,
      meters: all,
      ready: ready && meters !== undefined && bag !== undefined,
      kept,
    }
  }, [meters, bag, setup, set, ready, kept])
}

/** `Leads not nulled, part 20 °C, meter 20 °C`. */
export function setupWords({ meter, setup }: MeterView, quantity: Quantity): string {
  if (meter === null) return 'No meter picked'
  const leads =
    quantity === 'resistance' ? [setup.nulled ? 'leads nulled' : 'leads not nulled'] : []
  const words = [...leads, ...temperatureWords(setup)].join(', ')
  return `${words.slice(0, 1).toUpperCase()}${words.slice(1)}`
}

/** The same in the fewest words, for a key: `Not nulled, 20 °C`. */
export function setupShort({ meter, setup }: MeterView, quantity: Quantity): string {
  if (meter === null) return 'Pick a meter'
  const leads = quantity !== 'resistance' ? [] : [setup.nulled ? 'nulled' : 'not nulled']
  const { partTempC, meterTempC } = setup
  const said = partTempC !== null && meterTempC !== null
  const temps = said
    ? [
        partTempC === meterTempC
          ? degrees(partTempC)
          : `${degrees(partTempC)}, ${degrees(meterTempC)}`,
      ]
    : ['no temperature']
  const words = [...leads, ...temps].join(', ')
  return `${words.slice(0, 1).toUpperCase()}${words.slice(1)}`
}

function temperatureWords({ partTempC, meterTempC }: MeterSetup): string[] {
  if (partTempC === null && meterTempC === null) return ['temperatures not said']
  return [
    partTempC === null ? 'part temperature not said' : `part ${degrees(partTempC)}`,
    meterTempC === null ? 'meter temperature not said' : `meter ${degrees(meterTempC)}`,
  ]
}

const degrees = (celsius: number): string => `${String(celsius).replace('-', '−')} °C`
