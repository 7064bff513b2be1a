import { limitsOf } from '@/lib/diag/reading-budget'
import type { Judged } from '@/lib/diag/spec-of'
import { bandWords } from '../reading-strip/verdict'

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
