/**
 * Ways out as stops of the plan (rule R10: refusals before arithmetic). Limping out is only on the table once
 * the cause is as good as proved, the book lists it as one to limp on, and nothing refuses it.
 */
import type { Reckoning } from './belief'
import type { Case } from './case'
import type { LeftOut, Means } from './plan-means'
import type { SingleModel } from './troubleshoot-model'

/** The cause counts as known from this chance on. */
export const CAUSE_KNOWN = 0.9
/** Minutes of a ride out at walking pace (common practice, no source). */
const LIMP_MINUTES = 30

/** Tow and return later always; limp out only where nothing refuses it, else with the reason. */
export function stopsOf(
  c: Case,
  { shop }: Means,
  { suspects, last }: Reckoning,
): { stops: SingleModel['stops']; leftOut: LeftOut[] } {
  const costByFault = laterCosts(c, { shop, faults: suspects.map((s) => s.fault) })
  const stops = [
    { id: 'tow', cost: shop.towMinor, costByFault },
    { id: 'returnLater', cost: shop.recoveryMinor, costByFault },
  ]
  const highest = Math.max(...last.marginals)
  const top = last.marginals.indexOf(highest)
  const fault = c.index.faults.get(suspects[top]?.fault ?? '')
  const refused = (reason: string) => ({
    stops,
    leftOut: [{ id: 'limpOut', kind: 'stop' as const, reason }],
  })
  if (fault === undefined || highest < CAUSE_KNOWN)
    return refused('Limping out is refused while the cause is not known.')
  if (fault.limpRefused !== null) return refused(fault.limpRefused)
  if (fault.wayOut !== 'limpOut') return refused('Not a fault to ride out on.')
  const others = suspects.filter((s) => s.fault !== fault.id).map((s) => s.fault)
  const strandedAgain = Object.fromEntries(others.map((id) => [id, shop.towMinor]))
  const limp = {
    id: 'limpOut',
    cost: 0,
    minutes: LIMP_MINUTES,
    costByFault: added(costByFault, strandedAgain),
  }
  return { stops: [...stops, limp], leftOut: [] }
}

/** What each fault still costs once the machine is out: its repair is only put off, never spared. */
function laterCosts(
  { index, spec }: Case,
  { shop, faults }: { shop: Means['shop']; faults: readonly string[] },
): Record<string, number> {
  const costs: Record<string, number> = {}
  for (const fault of faults) {
    const repair = index.faults.get(fault)?.repair
    if (repair == null) continue
    const part = spec?.parts.find((p) => p.part === repair.part)
    const work = repair.minutes * shop.perMinuteMinor
    costs[fault] = repair.costMinor + (part?.genuineMinor ?? 0) + work
  }
  return costs
}

function added(a: Record<string, number>, b: Record<string, number>): Record<string, number> {
  const keys = [...new Set([...Object.keys(a), ...Object.keys(b)])]
  return Object.fromEntries(keys.map((k) => [k, (a[k] ?? 0) + (b[k] ?? 0)]))
}
