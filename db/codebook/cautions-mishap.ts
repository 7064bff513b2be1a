import type { Caution } from '@/lib/model/code-book'

/** Cautions of the mishap chapter, said the same way wherever they apply; signal words after ANSI Z535.6. */
export const NO_CRANK_WATER: Caution = {
  signal: 'WARNING',
  text: 'Water cannot be squeezed: one turn of the starter bends the rod or breaks the case. Plugs out before anybody cranks, pulls or kicks.',
}
export const SPRAYS_OUT: Caution = {
  signal: 'WARNING',
  text: 'Water, oil or fuel shoots out of open plug holes. Faces away, caps grounded far from the holes, no flame near.',
}
export const BY_HAND: Caution = {
  signal: 'WARNING',
  text: 'Key out, neutral proved by pushing, brake on. Fingers clear of chain, belt and fan: they move with the engine.',
}
export const ROLL_BY_HAND: Caution = {
  signal: 'WARNING',
  text: 'Level ground, key out, neutral. Nobody in front or behind, feet and sleeves clear of wheels, track and chain.',
}
export const UNSTEADY: Caution = {
  signal: 'DANGER',
  text: 'A machine on its side can roll on and kill. Nobody below it; chock or strap it before hands go near.',
}
export const HOLD_ROLLED: Caution = {
  signal: 'WARNING',
  text: 'A machine that rolled stays on hold: nobody rides it before steering, brakes, throttle, wheels and fuel are examined.',
}
export const NO_FLAME: Caution = {
  signal: 'DANGER',
  text: 'Petrol vapour lies low and catches fire from a spark. Nobody smokes, no start, key stays off until all is dry and aired.',
}
export const STOP_SWITCH_FIRST: Caution = {
  signal: 'WARNING',
  text: 'A throttle that sticks runs away with you. Stop it with the stop switch, not the throttle, and do not ride it.',
}
export const KNOCK_STOP: Caution = {
  signal: 'WARNING',
  text: 'A deep knock can break the engine and lock the drive at speed. Stop it now; it is not ridden out.',
}
export const OIL_STOP: Caution = {
  signal: 'WARNING',
  text: 'An engine short of oil is ruined in minutes and may lock. Stop it at once; no start before the oil is right.',
}
export const HOT_OIL: Caution = {
  signal: 'CAUTION',
  text: 'Hot oil scalds. Let it cool until you can hold a hand on the case; gloves on.',
}
export const SLIPPERY_OIL: Caution = {
  signal: 'WARNING',
  text: 'Oil on a hot exhaust can burn, and oil on brakes or tyres takes their grip. Wipe it off before any ride.',
}
export const WOUND_SPRING: Caution = {
  signal: 'WARNING',
  text: 'The recoil spring is wound up and can fly out and cut. Glasses and gloves on; hold the drum until it has unwound.',
}
export const KICKS_BACK: Caution = {
  signal: 'WARNING',
  text: 'An engine that fires can kick the lever or rope back and break bones. Key off, stop switch to stop, plug cap off and grounded; gear in neutral.',
}
export const COLD_SKIN: Caution = {
  signal: 'CAUTION',
  text: 'Wet hands freeze to cold metal. Gloves on, and dry clothes before any long work.',
}
export const PEOPLE_FIRST: Caution = {
  signal: 'DANGER',
  text: 'People before machine: anyone hurt, trapped, soaked or cold is looked after first. Call for help now if in doubt.',
}
