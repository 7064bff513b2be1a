import type { Caution } from '@/lib/model/code-book'

/** Cautions of this chapter; signal words after ANSI Z535.6. */
export const NO_SECOND_CRANK: Caution = {
  signal: 'WARNING',
  text: 'Stopped dead, in water or on its side before: no second press. Plugs out first; liquid in a cylinder bends the rod.',
}
export const JUMP_RULES: Caution = {
  signal: 'DANGER',
  text: 'A frozen, swollen, leaking or unknown battery can burst: never jump or charge it. Engine of the giving machine stays off.',
}
export const LAST_CLAMP: Caution = {
  signal: 'DANGER',
  text: 'The last clamp sparks and battery gas explodes. Clamp it to bare engine metal far from the battery, glasses on.',
}
export const DIRECT_FEED: Caution = {
  signal: 'DANGER',
  text: 'A direct feed passes by the neutral and brake switches: it can run you down. Neutral proved by pushing, wheels or track chocked or clear of the ground.',
}
export const BRIDGE_BURNS: Caution = {
  signal: 'WARNING',
  text: 'A spanner or ring from plus to frame melts and burns. Rings off, minus off first and on last, never bridge the posts.',
}
export const SAME_FUSE: Caution = {
  signal: 'WARNING',
  text: 'A bigger fuse or a wire in its place sets the loom on fire. Same rating only, and one new fuse, not two.',
}
export const BURNT_WIRE: Caution = {
  signal: 'WARNING',
  text: 'Smell of burning or a hot wire: battery minus off now, hands off the loom, extinguisher near.',
}
export const MAY_CRANK: Caution = {
  signal: 'WARNING',
  text: 'The engine can turn and start while you work. Neutral proved by pushing, brake on, sleeves clear of belt, fan and chain.',
}
