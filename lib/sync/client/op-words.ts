import type { Op } from '@/lib/sync/protocol/op'

/** What a person wrote in a record, to be copied out of one that is stuck; null when it holds no words. */
export function wordsOf(op: Op): string | null {
  const found: string[] = []
  collect(op.fields, found)
  return found.length === 0 ? null : found.join('\n')
}

/** Names of fields in which people write. */
const WRITTEN: ReadonlySet<string> = new Set([
  'words',
  'caption',
  'reason',
  'reasons',
  'differed',
  'asTyped',
  'unit',
  'partWords',
  'note',
  'value',
  'unitNumber',
  'serial',
  'makerTyped',
  'modelTyped',
  'number',
])

function collect(value: unknown, into: string[]): void {
  if (typeof value !== 'object' || value === null) return
  for (const [name, part] of Object.entries(value)) {
    if (WRITTEN.has(name) && (typeof part === 'string' || typeof part === 'number')) {
      const words = String(part).trim()
      if (words !== '') into.push(words)
    } else collect(part, into)
  }
}
