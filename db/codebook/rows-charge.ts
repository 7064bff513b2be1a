import type { Chapter } from './chapter'
import { COOLING_ROWS } from './rows-charge-heat'

/** Battery, start and dash: a machine that does not charge has run its battery down by the time it is looked at. */
const RUN_DOWN: Chapter['rows'] = {
  batteryRest: {
    statorFault: [31, 20, 49],
    regulatorDead: [29, 18, 53],
    regulatorFailed: [24, 12, 64],
    regulatorOvercharges: [74, 10, 16],
    chargingPlugBurnt: [38, 20, 42],
    loadTooGreat: [30, 22, 48],
  },
  batteryCranking: {
    statorFault: [37, 20, 43],
    regulatorDead: [34, 19, 47],
    regulatorFailed: [30, 15, 55],
    regulatorOvercharges: [66, 14, 20],
    chargingPlugBurnt: [46, 19, 35],
    loadTooGreat: [42, 20, 38],
  },
  batteryLoadHold: { regulatorOvercharges: [62, 14, 24] },
  dashAtKeyOn: {
    statorFault: [61, 36, 3],
    regulatorDead: [58, 38, 4],
    regulatorOvercharges: [70, 28.5, 1.5],
    chargingPlugBurnt: [64, 33, 3],
    loadTooGreat: [72, 26, 2],
  },
  storedCodes: {
    statorFault: [46, 38, 16],
    regulatorDead: [45, 40, 15],
    regulatorFailed: [40, 34, 26],
    regulatorOvercharges: [41, 45, 14],
    chargingPlugBurnt: [49, 36, 15],
    loadTooGreat: [60, 31, 9],
  },
  pumpPrimeListen: {
    statorFault: [73, 21, 6],
    regulatorDead: [71, 22, 7],
    chargingPlugBurnt: [75, 19, 6],
    loadTooGreat: [78, 18, 4],
  },
  pumpPlugVolts: {
    statorFault: [73, 23, 4],
    regulatorDead: [71, 24, 5],
    chargingPlugBurnt: [75, 21, 4],
    loadTooGreat: [79, 18, 3],
  },
  modulePowerGround: {
    statorFault: [77, 20, 3],
    regulatorDead: [75, 21, 4],
    chargingPlugBurnt: [78, 19, 3],
    regulatorOvercharges: [80, 18, 2],
  },
  crankingSound: {
    statorFault: [58, 40, 2],
    regulatorDead: [56, 42, 2],
    regulatorFailed: [53, 45, 2],
    chargingPlugBurnt: [64, 34, 2],
    loadTooGreat: [66, 32, 2],
  },
  startSound: {
    statorFault: [52, 24, 14, 6, 3, 0.5, 0.5],
    regulatorDead: [50, 24, 16, 6, 3, 0.5, 0.5],
    regulatorFailed: [40, 20, 14, 22, 3, 0.5, 0.5],
    chargingPlugBurnt: [57, 22, 12, 6, 2, 0.5, 0.5],
    loadTooGreat: [60, 22, 11, 4, 2, 0.5, 0.5],
  },
  jumpStart: {
    statorFault: [47, 13, 40],
    regulatorDead: [45, 14, 41],
    regulatorFailed: [62, 16, 22],
    chargingPlugBurnt: [52, 12, 36],
    loadTooGreat: [53, 10, 37],
  },
  lampsWhilePress: {
    statorFault: [53, 34, 13],
    regulatorDead: [51, 34, 15],
    regulatorFailed: [36, 26, 38],
    chargingPlugBurnt: [57, 31, 12],
    loadTooGreat: [58, 31, 11],
  },
  directLoads: {
    statorFault: [47, 8, 36, 9],
    regulatorDead: [45, 8, 36, 11],
    chargingPlugBurnt: [51, 8, 32, 9],
    loadTooGreat: [53, 8, 32, 7],
  },
  fuseBothSides: {
    statorFault: [66, 4, 28, 1, 1],
    regulatorDead: [64, 4, 30, 1, 1],
    chargingPlugBurnt: [68, 5, 21, 5, 1],
    loadTooGreat: [72, 4, 22, 1, 1],
  },
  keyWiggle: {
    statorFault: [74, 24, 2],
    regulatorDead: [73, 25, 2],
    chargingPlugBurnt: [75, 22, 3],
  },
  assistLamp: { statorFault: [69, 26, 5], regulatorDead: [67, 28, 5] },
}

/** Stator, plug and regulator where other checks come across them. */
const CHARGING: Chapter['rows'] = {
  mainFuseLook: { chargingPlugBurnt: [80, 17, 3], loadTooGreat: [82, 14, 4] },
  newFuseHolds: { chargingPlugBurnt: [88, 9, 2, 1], statorFault: [90, 5, 4, 1] },
  drainCurrent: { regulatorOvercharges: [76, 10, 14], statorFault: [86, 8, 6] },
  harnessWiggle: { chargingPlugBurnt: [66, 16, 18], statorFault: [80, 13, 7] },
  pinsWetLook: {
    chargingPlugBurnt: [56, 34, 10],
    regulatorDead: [70, 25, 5],
    fanCircuitFault: [62, 31, 7],
  },
  waterlineLook: {
    chargingPlugBurnt: [51, 30, 19],
    fanCircuitFault: [46, 31, 23],
    radiatorPacked: [49, 32, 19],
  },
  coilPeakVolts: { statorFault: [74, 17, 9] },
  sparkCranking: { statorFault: [79, 16, 5] },
  flywheelKey: { statorFault: [74, 22, 4] },
}

/** What this chapter's faults do to checks that other chapters wrote; guesses, of 100. */
export const CHARGE_ROWS: Chapter['rows'] = joined(RUN_DOWN, CHARGING, COOLING_ROWS)

/** The same of swaps. */
export const CHARGE_SWAP_ROWS: Chapter['swapRows'] = {
  batterySwap: {
    statorFault: [47, 51, 2],
    regulatorDead: [46, 52, 2],
    regulatorFailed: [56, 42, 2],
    regulatorOvercharges: [70, 27, 3],
    chargingPlugBurnt: [50, 48, 2],
    loadTooGreat: [44, 52, 4],
  },
  plugSwap: { headGasketLeaking: [80, 18, 2], fanBeltBroken: [78, 20, 2] },
}

/** Rows of several groups put together, check by check. */
function joined(...groups: readonly Chapter['rows'][]): Chapter['rows'] {
  const all: Record<string, Record<string, readonly number[]>> = {}
  for (const group of groups)
    for (const [check, rows] of Object.entries(group)) all[check] = { ...all[check], ...rows }
  return all
}
