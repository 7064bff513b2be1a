/**
 * Ways out as stops of the plan (rule R10: refusals before arithmetic). Tow and return later are always there.
 * Limping out never is: most of what forbids it nobody has been asked before the way-out screen, and a plan
 * that counts on a ride which is then refused is worse than none. It is listed as left out, with the reason.
 */
import type { Reckoning } from './belief'
import type { Case } from './case'
import type { LeftOut, Means } from './plan-means'
import type { SingleModel } from './troubleshoot-model'
import { CAUSE_KNOWN, type LimpRefusal, limpRefusals } from './way-out'

/** Tow and return later, and why limping out is not among them. */
export function stopsOf(
  c: Case,
  { shop }: Means,
  reckoning: Reckoning,
): { stops: SingleModel['stops']; leftOut: LeftOut[] } {
  const faults = reckoning.suspects.map((s) => s.fault)
  const costByFault = laterCosts(c, { shop, faults })
  return {
    stops: [
      { id: 'tow', cost: shop.towMinor, costByFault },
      { id: 'returnLater', cost: shop.recoveryMinor, costByFault },
    ],
    leftOut: [{ id: 'limpOut', kind: 'stop', reason: whyNotLimp(c, reckoning) }],
  }
}

/** The first reason on record against a limp out; without one, that the rest has to be asked. */
function whyNotLimp(c: Case, { suspects, last }: Reckoning): string {
  const held = suspects
    .map(({ fault }, i) => {
      const name = c.index.faults.get(fault)?.name ?? fault
      return { fault, name, chance: last.marginals[i] ?? 0, ruledOutBy: null }
    })
    .sort((a, b) => b.chance - a.chance)
  const [refusal] = limpRefusals({
    // Whether somebody is hurt, and what is said by hand, the way-out screen asks.
    job: { people: { count: 1, hurt: false, missing: false, exposed: false }, before: [] },
    features: c.features,
    entries: c.entries,
    suspects: held,
    index: c.index,
    said: [],
  })
  if (refusal !== undefined) return refusalWords(refusal)
  const [top] = held
  if (top === undefined || top.chance < CAUSE_KNOWN)
    return 'Not advised while the cause is not known.'
  return c.index.faults.get(top.fault)?.wayOut === 'limpOut'
    ? 'The code book lists this as a fault to ride out on. Way out asks first what forbids it.'
    : 'Not a fault to ride out on.'
}

function refusalWords(refusal: LimpRefusal): string {
  switch (refusal.kind) {
    case 'emptyBattery':
      return `Refused: the battery read ${refusal.asTyped} ${refusal.unit} at rest; ${refusal.emptyAtVolts} V and less count as empty.`
    case 'faultForbids':
      return refusal.bookWords
    case 'causeUnknown':
      return 'Limping out is refused while the cause is not known.'
    case 'hurt':
    case 'said':
      return 'Refused by what was said.'
  }
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
