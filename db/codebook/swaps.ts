import type { SwapItem } from '@/lib/model/code-book'
import { GUESS } from './sources'

/**
 * Swaps with a known-good part in the order fit, refit, fit. The three figures per fault are, of 100:
 * no change / gone with the good part and not back with the old one / gone and back again. A wiring
 * fault can be cured by plugging and unplugging, so it often goes once and rarely comes back.
 */
export const SWAPS: SwapItem[] = [
  {
    kind: 'swap',
    id: 'coilSwap',
    name: 'Swap the ignition coil',
    fault: 'ignitionCoilPart',
    part: 'ignitionCoil',
    gate: {},
    minutes: 12,
    setups: ['sidePanelOff'],
    guideSafe: false,
    cautions: [
      {
        signal: 'WARNING',
        text: 'Ignition high voltage can knock you down. Key off before you touch the coil, its lead or its plug. People with a pacemaker keep away.',
      },
      {
        signal: 'CAUTION',
        text: 'The engine and exhaust may be hot enough to burn. Keep your arms off them or let it cool.',
      },
    ],
    steps: [
      { text: 'Start it with the old coil. Make sure the fault is there now.', caution: null },
      {
        text: 'Turn the key off. Wait ten seconds.',
        caution: null,
      },
      {
        text: 'Unplug the coil. Look at the pins: note anything green, bent or pushed back.',
        caution: null,
      },
      {
        text: 'Fit the known-good coil. It may hang loose if its metal touches the engine.',
        caution: null,
      },
      { text: 'Plug it in until it clicks. Push the cap home on the spark plug.', caution: null },
      {
        text: 'Start it and let it run as long as the fault used to need. Record: fault there or gone.',
        caution: {
          signal: 'WARNING',
          text: 'Neutral, brake on, nobody in front. Hands off the coil and its lead while the engine turns.',
        },
      },
      { text: 'Key off. Fit the old coil again, on the same plug.', caution: null },
      {
        text: 'Start it again. Record: fault back or still gone. This step is what makes the swap a proof.',
        caution: {
          signal: 'WARNING',
          text: 'Neutral, brake on, nobody in front. Hands off the coil and its lead while the engine turns.',
        },
      },
      {
        text: 'Key off. Fit the good coil for keeps and tighten it. Start it once more.',
        caution: null,
      },
    ],
    table: {
      ignitionCoilPart: [5, 5, 90],
      ignitionCoilWiring: [70, 28, 2],
      ignitionCoilSupply: [90, 9, 1],
      ignitionCoilDriver: [90, 9, 1],
      coilOutputLeaks: [45, 15, 40],
      sparkPlugBad: [80, 17, 3],
      keySwitchHarness: [80, 17, 3],
    },
    otherwise: [80, 17, 3],
    basis: 'commonPractice',
    basisWords:
      'A fault that goes with the good coil and comes back with the old one has moved with the part. Figures are guesses: how often a plug pushed home or a pause cures it instead.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'plugSwap',
    name: 'Swap the spark plug',
    fault: 'sparkPlugBad',
    part: 'sparkPlug',
    gate: {},
    minutes: 9,
    setups: [],
    guideSafe: true,
    cautions: [
      {
        signal: 'CAUTION',
        text: 'The engine is hot and burns. Let it cool or wear gloves.',
      },
      {
        signal: 'WARNING',
        text: 'Key off before the cap comes off. Never hold the cap while the engine turns.',
      },
    ],
    steps: [
      { text: 'Start it with the old plug. Make sure the fault is there now.', caution: null },
      { text: 'Key off. Pull the cap by its body, not by the lead.', caution: null },
      { text: 'Blow the dirt away around the plug. Turn the plug out.', caution: null },
      { text: 'Turn the known-good plug in by hand, then snug. Push the cap home.', caution: null },
      {
        text: 'Start it. Record: fault there or gone.',
        caution: {
          signal: 'WARNING',
          text: 'Neutral, brake on, nobody in front. Hands off the cap while the engine turns.',
        },
      },
      {
        text: 'Key off. Fit the old plug again and start it. Record: fault back or still gone.',
        caution: null,
      },
      { text: 'Key off. Fit the good plug for keeps.', caution: null },
    ],
    table: {
      sparkPlugBad: [8, 14, 78],
      coilOutputLeaks: [66, 30, 4],
      ignitionCoilPart: [84, 13, 3],
      ignitionCoilWiring: [82, 16, 2],
    },
    otherwise: [84, 14, 2],
    basis: 'commonPractice',
    basisWords:
      'A plug is the cheapest part to swap. A fresh plug also helps a weak spark along for a while, so gone once is not proof.',
    source: GUESS,
  },
  {
    kind: 'swap',
    id: 'relaySwap',
    name: 'Swap the fuel pump relay',
    fault: 'fuelPumpRelay',
    part: 'relay',
    gate: { fuelling: ['injection'] },
    minutes: 5,
    setups: ['seatOff'],
    guideSafe: true,
    cautions: [
      {
        signal: 'NOTICE',
        text: 'Only a relay with the same numbers and pins. Key off before it comes out.',
      },
      {
        signal: 'WARNING',
        text: 'The engine may start. Neutral, brake on, nobody in front.',
      },
    ],
    steps: [
      { text: 'Start it with the old relay. Make sure the fault is there now.', caution: null },
      {
        text: 'Key off. Pull the relay straight out. Look for brown or green pins.',
        caution: null,
      },
      { text: 'Push the known-good relay in until it sits flat.', caution: null },
      { text: 'Start it. Record: fault there or gone.', caution: null },
      {
        text: 'Key off. Put the old relay back. Start it. Record: fault back or still gone.',
        caution: null,
      },
      { text: 'Key off. Fit the good relay for keeps.', caution: null },
    ],
    table: {
      fuelPumpRelay: [8, 20, 72],
      fuelPumpWiring: [76, 22, 2],
      mainRelayFault: [84, 14, 2],
    },
    otherwise: [88, 11, 1],
    basis: 'commonPractice',
    basisWords:
      'A relay that clicks can still have burnt contacts. Pulling and pushing it also wipes the socket clean, so gone once is not proof.',
    source: GUESS,
  },
]
