import type { Caution } from '@/lib/model/code-book'

/** Cautions of drive, brakes, steering, wheels and track; signal words after ANSI Z535.6. */
export const TURNING_DRIVE: Caution = {
  signal: 'DANGER',
  text: 'Belt, clutch, chain and track take fingers off. Guards on, sleeves and hair tied, nobody beside or behind.',
}
export const KEY_OUT: Caution = {
  signal: 'WARNING',
  text: 'Key out and tether off before a hand goes near belt, chain or track. It must not be able to turn.',
}
export const ON_STAND: Caution = {
  signal: 'WARNING',
  text: 'A raised machine falls. Hard level ground, a stand made for it, chocks, two supports before hands go under.',
}
export const STAND_JUMPS: Caution = {
  signal: 'WARNING',
  text: 'Driven off the stand it jumps away. Strapped down, brake on until ready, low throttle, nobody in front or behind.',
}
export const IT_ROLLS: Caution = {
  signal: 'WARNING',
  text: 'In neutral with the brake off it rolls. Level ground, chock at hand, nobody below it.',
}
export const HOT_DRIVE: Caution = {
  signal: 'CAUTION',
  text: 'Belt, clutch and cover burn skin after a ride. Let them cool or wear gloves.',
}
export const HOT_BRAKE: Caution = {
  signal: 'CAUTION',
  text: 'A brake that drags burns skin. Hold the back of the hand near it first, never touch it straight away.',
}
export const BRAKE_FLUID: Caution = {
  signal: 'CAUTION',
  text: 'Brake fluid hurts eyes and skin and eats paint. Glasses on, rinse spills with water.',
}
export const NO_BRAKES: Caution = {
  signal: 'WARNING',
  text: 'No ride without one working brake circuit, not even a short one. On tow: rigid bar, or a second line behind downhill.',
}
export const NO_STEERING: Caution = {
  signal: 'WARNING',
  text: 'Loose steering, wheels or arms let go without warning. No ride until it is found and made fast.',
}
export const PINCH_TRACK: Caution = {
  signal: 'WARNING',
  text: 'Fingers get pinched between track, wheels and slides. Key out, hands outside the loop, never turn it with the throttle.',
}
export const BEAD_JUMPS: Caution = {
  signal: 'WARNING',
  text: 'A tyre bead jumps on with force. Never above the pressure marked on the tyre; stand back, fingers off the rim.',
}
export const CLUTCH_SPRING: Caution = {
  signal: 'WARNING',
  text: 'Springs inside a clutch fly out. It is not taken apart on the trail.',
}
export const HARD_LOAD: Caution = {
  signal: 'WARNING',
  text: 'Never free it with full throttle: the belt burns, or it lets go and jumps ahead.',
}
export const BRAKE_BEFORE_CHAIN: Caution = {
  signal: 'WARNING',
  text: 'With chain or shaft broken the brake may hold nothing, though its lever is firm. Chock it; on tow a rigid bar.',
}
export const BELT_TOW: Caution = {
  signal: 'NOTICE',
  text: 'Towing with the belt on and no neutral harms clutch and engine. Belt off, or neutral, as the spec sheet says.',
}
export const KEY_OFF_PLUG: Caution = {
  signal: 'NOTICE',
  text: 'Key off before a plug comes off or goes on.',
}
export const ASSIST_MOVES: Caution = {
  signal: 'WARNING',
  text: 'The assist can turn the bars by itself. Hands and loose leads away from rods and bars while the key is on.',
}
