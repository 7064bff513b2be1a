import type { CodeWords } from '@/lib/diag/code-words'
import type { CodeContext } from '@/lib/model/code-seen'
import { sentence } from '../field/words'

const STATUS = { active: 'active', stored: 'stored', unknown: 'active or stored not shown' }

/** "Ignition coil 1 primary: voltage above normal." */
export function codeMeans(words: CodeWords): string {
  if (words.unknown) return 'Not in the code book: kept as shown.'
  const failure = words.failure === null ? '' : `: ${words.failure.name}`
  const differs = words.makersDiffer ? ' This maker may differ.' : ''
  return `${sentence(words.circuitName)}${failure}.${differs}`
}

/** How a code stood when it was taken down: "Module 0, active, counted 4." */
export function contextWords({ module, status, count }: CodeContext): string {
  const words = [
    module === null ? '' : `module ${module}`,
    STATUS[status],
    count === null ? '' : `counted ${count}`,
  ].filter(Boolean)
  return `${sentence(words.join(', '))}.`
}
