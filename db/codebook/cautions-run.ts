import type { Caution } from '@/lib/model/code-book'

/** Cautions of this chapter; signal words after ANSI Z535.6. */
export const NO_FIRE: Caution = {
  signal: 'NOTICE',
  text: 'Spark must have a grounded plug or tester to jump to. An open lead can kill coil and module.',
}
export const HAND_TURN: Caution = {
  signal: 'WARNING',
  text: 'Fingers are crushed when the engine moves. Key out, plug cap off, one person turns and nobody else touches.',
}
export const PLATE_BITES: Caution = {
  signal: 'WARNING',
  text: 'The throttle plate is driven by a motor and shuts hard. Keep fingers and tools out of the bore with the key on.',
}
export const PLUG_HOLE: Caution = {
  signal: 'DANGER',
  text: 'Petrol mist blows out of an open plug hole and burns. Cap and tester well away, face and hands away, air it first.',
}
export const STAND_SAFE: Caution = {
  signal: 'WARNING',
  text: 'A machine that slips off its stand crushes. Level ground, chocks, a stand with a wide foot, nobody behind the wheel or track.',
}
export const BACKFIRE_BURNS: Caution = {
  signal: 'WARNING',
  text: 'A backfire throws flame from intake and exhaust. Air box shut, face and dry grass away, extinguisher near.',
}
export const LIMITED: Caution = {
  signal: 'WARNING',
  text: 'Power can come back without warning. No riding to test it near people, edges or traffic; key off when it acts by itself.',
}
export const NO_MORE_STARTS: Caution = {
  signal: 'NOTICE',
  text: 'Ten seconds of cranking, then a minute of rest. Long cranking kills starter and battery and floods the engine.',
}
