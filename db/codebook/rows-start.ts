import type { Chapter } from './chapter'

/** Looks that need no engine and no power: of 100, one figure per outcome of that check. */
const LOOKS: Chapter['rows'] = {
  stopSwitchLook: { startButtonFault: [73, 24, 3] },
  pinsWetLook: {
    startButtonFault: [56, 35, 9],
    starterRelayFault: [64, 29, 7],
    interlockOpen: [61, 32, 7],
    mainFuseOpen: [67, 26, 7],
    keySwitchHarness: [66, 28, 6],
    mainRelayFault: [67, 27, 6],
    regulatorFailed: [73, 23, 4],
    parasiticDrain: [68, 27, 5],
    starterMotorWorn: [70, 26, 4],
  },
  waterlineLook: {
    startButtonFault: [47, 33, 20],
    starterMotorWorn: [46, 31, 23],
    starterRelayFault: [50, 31, 19],
    interlockOpen: [51, 31, 18],
    gearPositionBad: [53, 30, 17],
    mainFuseOpen: [55, 29, 16],
    stopCircuitFault: [50, 32, 18],
    keySwitchHarness: [54, 30, 16],
    engineSeized: [53, 29, 18],
  },
  airFilterLook: { engineSeized: [65, 24, 11] },
  plugCapsTight: { interlockOpen: [78, 19, 3] },
  rolledWalk: {
    hydraulicLock: [24, 66, 6, 2, 2],
    interlockOpen: [34, 50, 14, 1, 1],
    startButtonFault: [35, 51, 12, 1, 1],
  },
}

/** Checks with power on and the engine still. */
const POWERED: Chapter['rows'] = {
  dashAtKeyOn: {
    mainFuseOpen: [6, 4, 90],
    batteryFailed: [29, 51, 20],
    parasiticDrain: [27, 47, 26],
    interlockOpen: [72, 27, 1],
    regulatorFailed: [34, 29, 37],
  },
  securityLamp: { batteryFailed: [83, 13, 4], parasiticDrain: [84, 12.5, 3.5] },
  storedCodes: {
    interlockOpen: [61, 35, 4],
    startButtonFault: [69, 26, 5],
    starterRelayFault: [63, 32, 5],
    batteryFailed: [38, 35, 27],
    parasiticDrain: [46, 32, 22],
    mainFuseOpen: [52, 22, 26],
  },
  gearLampSweep: { interlockOpen: [47, 24, 29], mainFuseOpen: [9, 5, 86] },
  gearSwitchMeter: { interlockOpen: [55, 14, 31] },
  rangeLever: { interlockOpen: [58, 25, 16, 1], mainFuseOpen: [10, 4, 85, 1] },
  pumpPrimeListen: {
    mainFuseOpen: [4, 2, 94],
    batteryFailed: [54, 31, 15],
    parasiticDrain: [50, 32, 18],
    regulatorFailed: [46, 17, 37],
  },
  pumpPlugVolts: {
    mainFuseOpen: [4, 3, 93],
    batteryFailed: [66, 22, 12],
    parasiticDrain: [64, 21, 15],
    batteryLow: [68, 22, 10],
  },
  fuelFlow: { mainFuseOpen: [4, 2, 94], batteryFailed: [54, 25, 21], parasiticDrain: [53, 24, 23] },
  coilSupplyDrop: { mainFuseOpen: [6, 3, 91] },
  keySupplyDrop: {
    mainFuseOpen: [12, 4, 84],
    waterInElectrics: [63, 14, 23],
    regulatorFailed: [56, 8, 36],
  },
  sensorSupplyVolts: {
    mainFuseOpen: [5, 1, 0.5, 93.5],
    batteryFailed: [77, 9, 1, 13],
    parasiticDrain: [75, 8, 1, 16],
  },
  modulePowerGround: {
    mainFuseOpen: [5, 3, 92],
    batteryFailed: [70, 20, 10],
    parasiticDrain: [71, 18, 11],
    regulatorFailed: [58, 10, 32],
  },
  oilLampWire: { mainFuseOpen: [7, 3, 90] },
  assistLamp: {
    mainFuseOpen: [5, 2, 93],
    batteryFailed: [55, 35, 10],
    parasiticDrain: [56, 31, 13],
  },
  fanAtKeyOn: {
    mainFuseOpen: [4, 3, 93],
    batteryFailed: [54, 32, 14],
    parasiticDrain: [55, 31, 14],
  },
  fanPlugBulb: { mainFuseOpen: [3, 1, 96], batteryFailed: [62, 25, 13] },
  fourWheelListen: {
    mainFuseOpen: [4, 3, 93],
    batteryFailed: [58, 25, 17],
    parasiticDrain: [56, 24, 20],
  },
}

/** Battery and its joints. */
const BATTERY: Chapter['rows'] = {
  batteryRest: { batteryFailed: [28, 15, 57], parasiticDrain: [14, 11, 75] },
  batteryCranking: {
    batteryFailed: [7, 9, 84],
    parasiticDrain: [16, 12, 72],
    starterMotorWorn: [62, 18, 20],
    engineSeized: [49, 18, 33],
    hydraulicLock: [52, 19, 29],
  },
  postDrop: { starterMotorWorn: [83, 9, 8], engineSeized: [79, 12, 9] },
  groundDrop: { starterMotorWorn: [80, 12, 8], engineSeized: [76, 13, 11] },
  harnessWiggle: { mainFuseOpen: [62, 18, 20], interlockOpen: [78, 14, 8] },
}

/** Checks that turn the engine, by starter or by hand. */
const TURNING: Chapter['rows'] = {
  crankingSound: {
    batteryFailed: [30, 68, 2],
    parasiticDrain: [34, 64, 2],
    starterMotorWorn: [47, 51, 2],
    starterClutchSlips: [30, 12, 58],
    hydraulicLock: [33, 61, 6],
    engineSeized: [58, 40, 2],
    keySwitchHarness: [80, 18, 2],
  },
  compressionTest: {
    batteryFailed: [60, 37, 3],
    parasiticDrain: [61, 36, 3],
    starterMotorWorn: [68, 29, 3],
    starterClutchSlips: [54, 24, 22],
    engineSeized: [30, 40, 30],
  },
  secondKey: {
    interlockOpen: [83, 16, 1],
    startButtonFault: [82, 17, 1],
    starterRelayFault: [85, 14, 1],
    gearPositionBad: [87, 12, 1],
  },
  sparkCranking: {
    batteryFailed: [44, 40, 16],
    parasiticDrain: [48, 38, 14],
    starterMotorWorn: [68, 27, 5],
    mainFuseOpen: [3, 1, 96],
  },
  plugWetOrDry: {
    batteryFailed: [59, 23, 18],
    mainFuseOpen: [8, 86, 6],
    hydraulicLock: [12, 8, 80],
  },
  fuelPressureGauge: { batteryFailed: [56, 14, 0, 30], mainFuseOpen: [3, 0.5, 0, 96.5] },
  injectorBlink: { mainFuseOpen: [3, 1, 96], batteryFailed: [64, 24, 12] },
  crankSensorPeak: {
    batteryFailed: [66, 15, 19],
    starterMotorWorn: [73, 13, 14],
    parasiticDrain: [68, 15, 17],
    starterClutchSlips: [38, 8, 54],
  },
  sparkWhileItDies: { mainFuseOpen: [18, 6, 76], batteryFailed: [56, 29, 15] },
  plugsOutTurn: { hydraulicLock: [80, 16, 4] },
  oilGlitter: { engineSeized: [35, 35, 30], starterMotorWorn: [86, 12, 2] },
  plugRead: { engineSeized: [45, 15, 40] },
}

/** What this chapter's faults do to checks that other chapters wrote. */
export const START_ROWS: Chapter['rows'] = { ...LOOKS, ...POWERED, ...BATTERY, ...TURNING }
