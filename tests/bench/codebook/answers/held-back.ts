import type { Answered } from '../stranded'

/** A side-by-side held at a fast walk with three codes that have nothing in common but a loose engine ground strap. */
export const HELD_BACK: Answered = {
  conditions: ['capped', 'comesAndGoes', 'manyLamps', 'turnedSlowly', 'afterWork'],
  ends: {
    // The strap itself: bolt loose by hand, paint and rust under the eye.
    postsFeel: 'loose',
    groundDrop: 'outHigh',
    chargeMinusDrop: 'outHigh',
    // Some 150 watts are lost in that eye for as long as it cranks.
    warmJointFeel: 'joint',
    // Nothing jumps but near the strap, and there each time.
    harnessWiggle: 'falters',
    // With pump current alone less than the 0.9 V of the fan, but not nothing.
    modulePowerGround: 'some',
    // 11.2 V at the posts, less 1.6 V in the strap and 0.2 V on the plus side: about 9.4 V for the starter.
    crankingSound: 'uneven',
    startSound: 'slow',
    starterStudVolts: 'outLow',
    // The last clamp of a jump lead sits on the engine and so goes round the strap.
    jumpStart: 'cranks',
    storedCodes: 'many',
    // The lights are one of the two loads that bring the lamp back.
    dashAtKeyOn: 'odd',
    // Well after the key was off, until the fan cuts in; a warm engine that stood two minutes soon asks for it.
    limpReset: 'later',
    // The half minute with the key off makes it well for a while, whatever the sensor does.
    tipOverReset: 'cured',
    // It idles well by itself, so with a little throttle it runs as well.
    littleThrottle: 'runs',
  },
  swaps: {},
  // It starts, so no drops of fuel; it has a pedal, so no throttle housing on the bars.
  cannot: ['primeDrops', 'gripOpenLook'],
}
