import type { SpecSheet } from '@/lib/model/machine-model'

export type DemoComponent = SpecSheet['components'][number]
export type DemoPart = SpecSheet['parts'][number]

/** A figure of the demo manual: invented, and it says so. */
export const page = (number: number): string => `demo manual, page ${number} (invented)`
export const SHOP_FIGURE = "the demo shop's own figure (invented)"
/** A value starts with none of its limits known. */
export const NO_LIMITS = {
  nominal: null,
  tolerancePercent: null,
  low: null,
  high: null,
  partTempC: null,
  material: null,
  conditions: null,
} as const
