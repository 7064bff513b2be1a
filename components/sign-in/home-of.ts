import type { Role } from '@/lib/model/role'

const FIELD_ONLY: readonly Role[] = ['mechanic', 'guide']

export type Home = '/field' | '/desk' | '/desk/parts'

/** Where a person's work begins: the field, the parts desk for people who only work there, else the board. */
export function homeOf(roles: readonly Role[]): Home {
  if (roles.every((role) => FIELD_ONLY.includes(role))) return '/field'
  return roles.every((role) => role === 'parts') ? '/desk/parts' : '/desk'
}

/**
 * The page asked for before signing in, when it is one of ours; else null. Only paths under the two
 * places of work count, so that a link cannot send a signed-in person elsewhere.
 */
export function pathAskedFor(search: string): string | null {
  const to = new URLSearchParams(search).get('to')
  return to && /^\/(desk|field)(\/[A-Za-z0-9-]+)*$/.test(to) ? to : null
}
