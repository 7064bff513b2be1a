'use client'
import { useMemo } from 'react'
import type { ReadingInput } from '@/lib/diag/reading'
import type { Id } from '@/lib/model/id'
import type { MeterProfile } from '@/lib/model/meter-profile'
import { meterAtHand } from '../engine/use-case'
import { useDraft } from '../store/use-draft'
import { useBag, useMeters } from '../store/use-rows'
import type { Judged } from './spec-of'

/** How the meter stands for this job: kept on the phone between checks. */
export type MeterSetup = {
  meterId: Id | null
  nulled: boolean
  partTempC: number | null
  meterTempC: number | null
}
const FIRST: MeterSetup = { meterId: null, nulled: false, partTempC: null, meterTempC: null }

export type MeterView = {
  setup: MeterSetup
  change(next: MeterSetup): void
  meter: MeterProfile | null
  meters: readonly MeterProfile[]
  ready: boolean
}

/** The meter in hand and how it is set up for this job; the one in the bag until another is picked. */
export function useMeterSetup(jobId: Id): MeterView {
  const meters = useMeters()
  const bag = useBag()
  const { value: setup, set, ready } = useDraft<MeterSetup>(`meter:${jobId}`, FIRST)
  return useMemo(() => {
    const all = meters ?? []
    const picked = all.find((one) => one.id === setup.meterId) ?? meterAtHand(all, bag)
    return {
      setup,
      change: set,
      meter: picked,
      meters: all,
      ready: ready && meters !== undefined && bag !== undefined,
    }
  }, [meters, bag, setup, set, ready])
}

export type MeterInput = Omit<ReadingInput, 'value' | 'overRange'>

/** The engine's input of a reading before there is a value; null when this meter cannot read the quantity. */
export function meterInput(
  meter: MeterProfile | null,
  setup: MeterSetup,
  of: { quantity: ReadingInput['quantity']; judged: Judged },
): MeterInput | null {
  const meterFunction = meter?.functions[of.quantity]
  if (meter === null || meterFunction === undefined) return null
  return {
    quantity: of.quantity,
    meterFunction,
    leadsOhm: meter.leadsOhm,
    nulled: setup.nulled,
    partTempC: setup.partTempC,
    meterTempC: setup.meterTempC,
    perKelvin: meter.perKelvin,
    spec: of.judged.value,
  }
}

/** `Leads not nulled, part 20 °C, meter 20 °C`. */
export function setupWords(
  { meter, setup }: MeterView,
  quantity: ReadingInput['quantity'],
): string {
  if (meter === null) return 'No meter picked'
  const leads =
    quantity === 'resistance' ? [setup.nulled ? 'leads nulled' : 'leads not nulled'] : []
  const words = [...leads, ...temperatureWords(setup)].join(', ')
  return `${words.slice(0, 1).toUpperCase()}${words.slice(1)}`
}

/** The same in the fewest words, for a key: `Not nulled, 20 °C`. */
export function setupShort(
  { meter, setup }: MeterView,
  quantity: ReadingInput['quantity'],
): string {
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
