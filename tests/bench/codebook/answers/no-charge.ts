import type { Answered } from '../stranded'

/** A quad that does not charge: the stator winding is burnt through to its core. */
export const NO_CHARGE: Answered = {
  conditions: ['lowVoltsRunning'],
  ends: {
    // About 2 ohm from each leg to the engine; two of the three pairs give half the volts of the third.
    statorLegs: 'ground',
    statorVoltsRunning: 'uneven',
    // 11.9 V running, with and without the lights, and it does not rise with speed.
    chargeVoltsRunning: 'outLow',
    chargeVoltsLoaded: 'falls',
    // Battery as found, half empty. Charged it gives 10.6 V while cranking; half empty some 9.5 V.
    batteryRest: 'outLow',
    batteryCranking: 'tooClose',
    crankingSound: 'uneven',
    startSound: 'slow',
    starterStudVolts: 'outLow',
    lampsWhilePress: 'dims',
    jumpStart: 'cranks',
    storedCodes: 'oneCircuit',
    // The lamp stays on and the lights are dim.
    dashAtKeyOn: 'odd',
  },
  swaps: {},
  cannot: [],
}
