import type { Answered } from '../stranded'

/** A two-stroke snowmobile that starves after half a minute: the pulse hose of its fuel pump is split. */
export const SNOWMOBILE_STARVES: Answered = {
  // Half a minute is neither seconds nor minutes; the primer starts it again but does not keep it alive.
  conditions: ['always', 'fades'],
  ends: {
    // Hose split at the crankcase end, a few weak spurts, bowls nearly empty and not filled again by a standing engine.
    pulsePumpLook: 'bad',
    bowlFlow: 'none',
    // A few seconds more, no longer.
    chokeTry: 'helps',
    // The plugs come out dry and pale.
    plugWetOrDry: 'dry',
    // As with the primer: it runs on what it was given.
    primeDrops: 'fires',
    // Seals and reeds are tight, but the split hose still sits on the crankcase and lets the air out.
    caseTest: 'falls',
    // Filled at the pump like the others: its oil comes from a tank of its own, so the petrol is plain.
    mixRing: 'none',
  },
  swaps: {},
  cannot: [],
}
