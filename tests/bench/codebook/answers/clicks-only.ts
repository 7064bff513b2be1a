import type { Answered } from '../stranded'

/** An ATV that clicks and does not crank: the contacts of the starter relay are burnt. */
export const CLICKS_ONLY: Answered = {
  conditions: ['oneClick', 'nowAndThen'],
  ends: {
    startSound: 'click',
    // The order reaches the small terminals, but 12.2 V stay over the studs and 0.3 V arrive at the starter.
    relayBigDrop: 'outHigh',
    starterStudVolts: 'outLow',
    // The engine has not run and is cold.
    fanAtKeyOn: 'doubt',
  },
  swaps: { starterRelaySwap: 2 },
  cannot: [
    // The engine must turn or run, and at the button it does neither.
    'injectorBlink',
    'injectorListen',
    'sparkWhileItDies',
    'sparkCranking',
    'crankSensorPeak',
    'camSensorSignal',
    'plugWetOrDry',
    'primeDrops',
    'crankingSound',
    'compressionTest',
    'timingLight',
    'limpReset',
    'listenRod',
    'chargeVoltsRunning',
    'chargeVoltsLoaded',
    'chargePlusDrop',
    'chargeMinusDrop',
    // Dark on a cold engine says nothing.
    'fanPlugBulb',
  ],
}
