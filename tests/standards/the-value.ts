import type { Result } from '@/lib/model/result'

/** The value of a success; a failure ends the test with its problem. */
export function theValue<T, P>(result: Result<T, P>): T {
  if (!result.ok) throw new Error(JSON.stringify(result.problem))
  return result.value
}
