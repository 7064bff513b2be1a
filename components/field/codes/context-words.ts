import type { CodeContext } from '@/lib/model/code-seen'
import { sentence } from '../words'

/** "Module 0, active, counted 4." */
export function contextWords(context: CodeContext): string {
  const words = [
    context.module === null ? '' : `module ${context.module}`,
    { active: 'active', stored: 'stored', unknown: 'active or stored not shown' }[context.status],
    context.count === null ? '' : `counted ${context.count}`,
  ].filter(Boolean)
  return `${sentence(words.join(', '))}.`
}
