import { component } from './demo-build'
import { brakePads, driveChain, tyres } from './demo-common'
import type { DemoComponent } from './demo-figures'

/** Skerry 250, kick start, clutch, chain and brake: where things are and what they read. All invented. */
export const SKERRY_250_CHASSIS: DemoComponent[] = [
  component({
    id: 'kick1',
    name: 'Kick start',
    place: 'Right side; the lever folds out.',
    fasteners: 'One bolt, 12 mm head.',
    torqueNm: 25,
    page: 30,
  }),
  component({
    id: 'clutch1',
    name: 'Clutch',
    place: 'Right engine cover, six bolts.',
    fasteners: 'Cover: six bolts, 8 mm head. Springs: six bolts.',
    torqueNm: 10,
    page: 32,
    values: [
      {
        id: 'leverPlay',
        name: 'Free play at the lever end',
        quantity: 'length',
        low: 8,
        high: 13,
      },
    ],
  }),
  driveChain({ place: 'Left side; joining link with a clip.', page: 36, slack: [35, 50] }),
  tyres({ place: 'Front and rear alike, with tubes.', page: 37, kPa: [80, 100] }),
  brakePads({ place: 'Front wheel, seen from below the caliper.', page: 38, low: 1, torqueNm: 25 }),
]
