import type { Chapter } from './chapter'

/** What this chapter's faults show in the checks of the first chapter: of 100, one figure per outcome. */
export const RUN_ROWS: Chapter['rows'] = {
  crankSensorLook: { triggerWheelSlipped: [64, 22, 14] },
  sparkWhileItDies: {
    securityRefuses: [26, 5, 69],
    networkFault: [60, 9, 31],
    camSensorBad: [64, 16, 20],
    triggerWheelSlipped: [66, 20, 14],
    cylinderFlooded: [70, 23, 7],
  },
  coilPeakVolts: { securityRefuses: [34, 5, 61], triggerWheelSlipped: [80, 14, 6] },
  plugRead: {
    injectorLeaking: [18, 58, 24],
    cylinderFlooded: [8, 76, 16],
    lowCompression: [46, 27, 27],
    triggerWheelSlipped: [58, 29, 13],
    camTimingSlipped: [56, 31, 13],
    oxygenSensorBad: [46, 25, 29],
    airTempSensorBad: [52, 25, 23],
    powerValveStuck: [56, 19, 25],
    floatNeedleStuck: [32, 44, 24],
  },
  littleThrottle: {
    throttleActuatorBad: [48, 24, 28],
    camTimingSlipped: [64, 22, 14],
    lowCompression: [62, 23, 15],
    injectorLeaking: [54, 28, 18],
    cylinderFlooded: [66, 22, 12],
    oxygenSensorBad: [62, 24, 14],
    airTempSensorBad: [64, 23, 13],
  },
  throttleSweep: { throttleActuatorBad: [62, 17, 21] },
  valveGap: { camTimingSlipped: [58, 20, 22] },
  tipOverReset: {
    securityRefuses: [83, 4, 13],
    networkFault: [82, 4, 14],
    cylinderFlooded: [81, 4, 15],
  },
  harnessWiggle: {
    networkFault: [60, 16, 24],
    camSensorBad: [68, 15, 17],
    speedSensorBad: [76, 13, 11],
    gripSensorsDisagree: [64, 15, 21],
    throttleActuatorBad: [74, 13, 13],
    oxygenSensorBad: [78, 13, 9],
    securityRefuses: [80, 12, 8],
    sensorSupplyDown: [64, 15, 21],
  },
  modulePowerGround: { networkFault: [68, 16, 16], securityRefuses: [82, 11, 7] },
  injectorBlink: {
    securityRefuses: [16, 5, 79],
    camSensorBad: [50, 27, 23],
    networkFault: [61, 14, 25],
    triggerWheelSlipped: [72, 21, 7],
  },
  injectorListen: {
    injectorLeaking: [54, 38, 8],
    securityRefuses: [30, 7, 63],
    camSensorBad: [58, 26, 16],
  },
  pumpPrimeListen: { securityRefuses: [46, 5, 49], networkFault: [70, 9, 21] },
  pumpPlugVolts: { securityRefuses: [48, 4, 48], networkFault: [74, 7, 19] },
  fuelFlow: { securityRefuses: [60, 5, 35], networkFault: [76, 8, 16] },
  fuelSample: { injectorLeaking: [70, 19, 11] },
  fuelLeakWalk: { injectorLeaking: [56, 28, 16], cylinderFlooded: [54, 41, 5] },
  fuelPressureHold: { injectorLeaking: [12, 22, 66] },
  chokeTry: { lowCompression: [64, 26, 10], camTimingSlipped: [72, 21, 7] },
  chokePosition: { cylinderFlooded: [64, 15, 21] },
  airFilterLook: { lowCompression: [62, 29, 9], powerValveStuck: [78, 19, 3] },
}

/** The same for its swaps. */
export const RUN_SWAP_ROWS: Chapter['swapRows'] = {
  plugSwap: {
    cylinderFlooded: [34, 62, 4],
    injectorLeaking: [58, 39, 3],
    lowCompression: [78, 20, 2],
  },
  coilSwap: { triggerWheelSlipped: [83, 15, 2], camSensorBad: [82, 16, 2] },
}
