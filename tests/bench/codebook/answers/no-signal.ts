import type { Answered } from '../stranded'

/** A side-by-side that cranks without spark or injection: one pin of the crank sensor plug is eaten by water. */
export const NO_SIGNAL: Answered = {
  // It cut out on the ride for a second only, but like a switch; fast and strong is not faster than it used to.
  conditions: ['cutDead', 'afterWater'],
  ends: {
    // Water inside the plug, one pin green; sensor, gap and trigger wheel are sound.
    crankSensorLook: 'bad',
    crankLoomMeter: 'jumps',
    sensorSweep: 'bad',
    // P0335, active, and back each time it is cranked; so the engine sign is lit.
    storedCodes: 'oneCircuit',
    dashAtKeyOn: 'odd',
    limpReset: 'atOnce',
    // No engine speed, so the module gives neither spark nor injection, and the plugs stay dry.
    sparkCranking: 'none',
    sparkWhileItDies: 'stopsFirst',
    injectorBlink: 'stops',
    injectorListen: 'none',
    plugWetOrDry: 'dry',
    // The engine has not run and is cold.
    fanAtKeyOn: 'doubt',
  },
  swaps: {},
  cannot: [
    // It must run, and it does not.
    'littleThrottle',
    'coldPipe',
    'oxygenUnplug',
    'chargeVoltsRunning',
    'chargeVoltsLoaded',
    'chargePlusDrop',
    'listenRod',
    'smokeLook',
    // Without a spark the light does not flash.
    'timingLight',
    // Dark on a cold engine says nothing.
    'fanPlugBulb',
  ],
}
