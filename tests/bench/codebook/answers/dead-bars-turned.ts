import type { Answered } from '../stranded'

/** A quad that is dead: the feed wire of the key switch is chafed to one strand at the steering head. */
export const DEAD_BARS_TURNED: Answered = {
  conditions: ['darkOnRide', 'comesBack', 'barsMove', 'afterWork'],
  ends: {
    // Whole over the fuse, 0.3 V where the key switch is fed.
    fuseBothSides: 'after',
    // All that the key feeds is dead, all that the battery feeds straight is alive.
    dashAtKeyOn: 'dark',
    directLoads: 'keyDead',
    keySupplyDrop: 'outHigh',
    modulePowerGround: 'wrong',
    sensorSupplyVolts: 'outLow',
    coilSupplyDrop: 'outHigh',
    fourWheelListen: 'silent',
    fourWheelVolts: 'outHigh',
    assistLamp: 'never',
    assistDrop: 'outHigh',
    // By now turning the bars is no longer enough; a hand on the loom at the steering head still is.
    keyWiggle: 'once',
    harnessWiggle: 'falters',
    // Start pressed: no order reaches the starter relay, and a booster does not change that.
    startSound: 'silent',
    lampsWhilePress: 'out',
    relayOrder: 'none',
    starterStudVolts: 'outLow',
    // The pump gets no volts, so nothing flows and no pressure builds.
    pumpPrimeListen: 'silent',
    pumpPlugVolts: 'none',
    fuelFlow: 'little',
    fuelPressureGauge: 'outLow',
    // Sensors without supply read nothing, whatever their state.
    throttleSweep: 'jumps',
    camSensorSignal: 'none',
    speedSensorPulses: 'none',
    // A dark dash shows no neutral, no gear and no oil lamp, and there is no brake lamp.
    interlockLook: 'missing',
    rangeLever: 'dashDiffers',
    gearLampSweep: 'wrong',
    oilLampWire: 'lies',
    // The fan stands still, but the engine has cooled since it died.
    fanAtKeyOn: 'doubt',
  },
  swaps: {},
  cannot: [
    // It must turn or run, and it does neither.
    'injectorBlink',
    'injectorListen',
    'sparkWhileItDies',
    'sparkCranking',
    'crankSensorPeak',
    'plugWetOrDry',
    'crankingSound',
    'compressionTest',
    'timingLight',
    'limpReset',
    'chargeVoltsRunning',
    'chargeVoltsLoaded',
    'chargePlusDrop',
    'chargeMinusDrop',
    // Without a click the reading over the starter relay tells nothing.
    'relayBigDrop',
    // Nothing to read on a dark dash, and no hot engine to hold it against.
    'securityLamp',
    'storedCodes',
    'gaugeAgainstMetal',
    'fanPlugBulb',
  ],
}
