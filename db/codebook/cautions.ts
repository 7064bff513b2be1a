import type { Caution } from '@/lib/model/code-book'

/** Cautions said the same way wherever they apply; signal words after ANSI Z535.6. */
export const MOVES: Caution = {
  signal: 'WARNING',
  text: 'The machine can jump forward. Neutral proved by pushing it, brake on, nobody in front.',
}
export const MOVING_PARTS: Caution = {
  signal: 'WARNING',
  text: 'Belt, fan and chain turn. Hair, sleeves and meter leads tied away.',
}
export const HIGH_VOLTAGE: Caution = {
  signal: 'WARNING',
  text: 'Ignition high voltage. Hold no lead or cap while the engine turns. People with a pacemaker keep away.',
}
export const HOT_ENGINE: Caution = {
  signal: 'CAUTION',
  text: 'Engine and exhaust burn skin. Let them cool or wear gloves.',
}
export const VAPOUR: Caution = {
  signal: 'DANGER',
  text: 'Petrol vapour burns and explodes. No smoking, no flame, no spark near it. Wipe spills and let them dry first.',
}
export const FUEL_PRESSURE: Caution = {
  signal: 'DANGER',
  text: 'The fuel line is under pressure and sprays. Let the pressure off first, glasses on, rag round the joint.',
}
export const NEAR_FUEL_SPARK: Caution = {
  signal: 'WARNING',
  text: 'A slipped probe makes a spark close to fuel. Air the place first; do not do this where you smell petrol.',
}
export const BATTERY_GAS: Caution = {
  signal: 'DANGER',
  text: 'A battery gives off gas that explodes. No flame or sparks over it, glasses on. Leave a swollen or frozen one alone.',
}
export const KEY_OFF: Caution = {
  signal: 'NOTICE',
  text: 'Key off before any plug comes off or goes on: the control module can be killed by it.',
}
export const MONOXIDE: Caution = {
  signal: 'DANGER',
  text: 'Exhaust gas kills in closed places. Run the engine only in open air.',
}
