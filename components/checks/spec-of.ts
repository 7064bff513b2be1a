import { limitsOf } from '@/lib/diag/reading-budget'
import { specFor } from '@/lib/diag/verdict-table'
import type { CheckItem, SpecSheet, SpecValue } from '@/lib/model/code-book'
import { bandWords } from '../reading-strip/verdict'

export type SpecComponent = SpecSheet['components'][number]
export type Judged = {
  value: SpecValue | null
  /** `sheet`: the model's own figure. `practice`: the code book's, for want of one. */
  from: 'sheet' | 'practice' | 'none'
  component: SpecComponent | null
}

/** Which figure judges a numeric check: the spec sheet first, else common practice, always told apart. */
export function specOf(check: CheckItem, sheet: SpecSheet | null): Judged {
  const { reading } = check
  if (reading === null) return { value: null, from: 'none', component: null }
  const component = sheet?.components.find((one) => one.id === reading.component) ?? null
  const value = specFor({ spec: sheet }, check)
  const own = component?.values.some((one) => one.id === reading.value) ?? false
  return { value, from: value === null ? 'none' : own ? 'sheet' : 'practice', component }
}

/** One short line for under the rule: where the band comes from. */
export function sourceOf({ value, from }: Judged): string {
  if (value === null || from === 'none') return 'No figure to judge by: kept without a verdict.'
  return `${from === 'sheet' ? 'Spec sheet' : 'Common practice'}: ${value.source}.`
}

/** The band in words, where it comes from and how sure. */
export function provenanceOf(judged: Judged): string {
  const { value, from } = judged
  if (value === null || from === 'none')
    return 'No figure on the spec sheet and none in the code book: this reading is kept without a verdict.'
  const limits = limitsOf(value)
  const band = limits === null ? '' : `Good: ${bandWords(limits)} ${value.unit}`
  const at = value.partTempC === null ? '' : ` at ${value.partTempC} °C`
  const label = from === 'sheet' ? 'spec sheet' : 'common practice'
  return `${band}${at}, ${label}: ${value.source}.`
}
