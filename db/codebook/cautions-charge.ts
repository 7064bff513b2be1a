import type { Caution } from '@/lib/model/code-book'

/** Cautions of charging and cooling; signal words after ANSI Z535.6. */
export const SCALDS: Caution = {
  signal: 'WARNING',
  text: 'Hot coolant shoots out and scalds. Cap, bleed screw and hoses stay shut until a hand can rest on the engine.',
}
export const FAN_STARTS: Caution = {
  signal: 'WARNING',
  text: 'The fan starts by itself, even with the key off. Fingers, sticks and sleeves out of the blades.',
}
export const POISON: Caution = {
  signal: 'CAUTION',
  text: 'Coolant is poison and tastes sweet. Catch it, wipe it up, keep children and animals away, wash hands.',
}
export const TWO_STROKE_SEIZES: Caution = {
  signal: 'WARNING',
  text: 'A hot two-stroke seizes and locks the drive at speed. Stop it at the first fading; it is not ridden hot.',
}
export const COOL_FIRST: Caution = {
  signal: 'NOTICE',
  text: 'Let it cool by itself. Cold water on hot metal cracks it, and a start while it is hot can seize it.',
}
export const STATOR_SHOCK: Caution = {
  signal: 'WARNING',
  text: 'With its plug off the stator makes well over 50 V and shocks. Probes fixed before the start; touch nothing bare while it runs.',
}
export const SPEED_CAP: Caution = {
  signal: 'WARNING',
  text: 'It must not take up the drive: stay below engagement speed of the spec sheet, neutral if it has one, brake on, nobody in front.',
}
export const BOILING_BATTERY: Caution = {
  signal: 'DANGER',
  text: 'An overcharged battery spits acid and explodes; lithium burns. Swollen, hot or hissing: key off, stand away, touch nothing.',
}
export const UNPLUGGED_RUNS: Caution = {
  signal: 'NOTICE',
  text: 'Never lift a battery clamp while it runs: the volts shoot up and kill modules.',
}
export const HOT_REGULATOR: Caution = {
  signal: 'CAUTION',
  text: 'Regulator and its plug burn skin. Back of the hand near them first.',
}
export const NO_JET: Caution = {
  signal: 'NOTICE',
  text: 'A hard jet lays fins flat and drives water into bearings and plugs. Soft jet, from a distance.',
}
export const BLADES: Caution = {
  signal: 'WARNING',
  text: 'Fan blades cut. Key off, tether out; the fan is turned by a stick or a gloved hand only.',
}
