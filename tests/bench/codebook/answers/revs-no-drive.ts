import type { Answered } from '../stranded'

/** A snowmobile that revs and stands: the chain in the chain case is broken and lies at the bottom. */
export const REVS_NO_DRIVE: Answered = {
  conditions: ['revsNoMove', 'bangFirst'],
  ends: {
    // Both clutches and the jackshaft turn behind their cover; the track stands.
    engageWatch: 'nothing',
    // Track, drive axle and lower sprocket go round by themselves; driven clutch and brake disc stay behind.
    trackTurn: 'alone',
    trackBrakeHold: 'turns',
    chainCaseDip: 'bits',
    // A smear of oil at the lower edge of the chain case cover, the engine dry above it.
    underDrips: 'oil',
    oilWhere: 'gearCase',
    // Pushed, the lower sprocket stirs the chain that lies under it: a clatter, though it rolls easily.
    rollByHand: 'scrapes',
    // Nothing but loose snow in the tunnel.
    iceLook: 'snow',
  },
  swaps: {},
  cannot: [],
}
