import type { Answered } from '../stranded'

/** A dirt bike that runs lean at idle: the boot between carburettor and head is torn under its clamp. */
export const RUNS_LEAN: Answered = {
  // The idle hangs and then stalls, the pops come on a shut throttle; wide open it is nearly fine.
  conditions: ['atIdle', 'surges'],
  ends: {
    // Torn half round, clamp screwed over the lip; mist and a squeeze by hand both change the idle at once.
    intakeBootFeel: 'open',
    intakeMist: 'changes',
    // Steadier idle and no pops with the choke pulled.
    chokeTry: 'helps',
    // A lean engine that starts: its plug comes out white to pale grey and dry.
    plugWetOrDry: 'dry',
    // It is the shut throttle that stalls it.
    littleThrottle: 'runs',
    // The rings are sound, but a spoon of oil takes up a good part of so small a chamber and lifts the figure by itself.
    compressionWet: 'some',
  },
  swaps: {},
  cannot: [
    // It starts, so no drops of fuel.
    'primeDrops',
    // The tank stands above the carburettor: no pump to look at.
    'pulsePumpLook',
  ],
}
