import type { CheckItem } from '@/lib/model/code-book'
import type { SpecSheet, SpecValue } from '@/lib/model/machine-model'
import type { Case } from './case'

/** A component of a model's spec sheet. */
export type SpecComponent = SpecSheet['components'][number]

/** The figure that judges a numeric check, with where it comes from. */
export type Judged = {
  value: SpecValue | null
  /** `sheet`: the model's own figure. `practice`: the code book's, for want of one (rule R18). */
  from: 'sheet' | 'practice' | 'none'
  /** The component on the sheet, also when it has no figure of its own. */
  component: SpecComponent | null
}

/** Which figure judges a check: the spec sheet first, else common practice (R18), always told apart. */
export function specOf(check: CheckItem, sheet: SpecSheet | null): Judged {
  const { reading } = check
  if (reading === null) return { value: null, from: 'none', component: null }
  const component = sheet?.components.find((one) => one.id === reading.component) ?? null
  const own = component?.values.find((one) => one.id === reading.value)
  if (own !== undefined) return { value: own, from: 'sheet', component }
  const value = practiceOf(check)
  return { value, from: value === null ? 'none' : 'practice', component }
}

/** The same figure alone; null where neither the sheet nor the code book has one. */
export const specFor = ({ spec }: Pick<Case, 'spec'>, check: CheckItem): SpecValue | null =>
  specOf(check, spec).value

/** The code book's own limits for a check, as a figure without nominal value or conditions. */
function practiceOf({ name, reading }: CheckItem): SpecValue | null {
  if (reading?.fallback == null) return null
  const { low, high, unit, source } = reading.fallback
  return {
    id: reading.value,
    name,
    quantity: reading.quantity,
    unit,
    nominal: null,
    tolerancePercent: null,
    low,
    high,
    partTempC: null,
    material: null,
    conditions: null,
    source,
  }
}
