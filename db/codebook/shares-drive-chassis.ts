import type { ShareList } from './chapter'
import { BIKE, FOUR_WHEELS, SLED } from './gates-drive'

/** Brakes, steering, tyres and track: of 100 such calls, guesses without a count behind them (rule R5). */
const BRAKE_SHARES: ShareList[] = [
  {
    symptom: 'brakesPoor',
    gate: FOUR_WHEELS,
    somethingElse: 6,
    of100: {
      brakePadsGone: 18,
      brakeFluidLost: 17,
      brakeAirBoiled: 17,
      brakeIced: 10,
      caliperSeized: 8,
      parkBrakeDragging: 5,
      brakeCableOrRod: 5,
      masterPassing: 5,
      brakePadsOiled: 3,
      wheelBearingWorn: 3,
      brakeDiscBent: 2,
      wheelSpeedSensorBad: 1,
    },
  },
  {
    symptom: 'brakesPoor',
    gate: SLED,
    somethingElse: 6,
    of100: {
      brakeAirBoiled: 20,
      brakeIced: 18,
      brakePadsGone: 16,
      brakeFluidLost: 10,
      parkBrakeDragging: 8,
      caliperSeized: 7,
      brakePadsOiled: 5,
      masterPassing: 4,
      brakeCableOrRod: 2,
      driveBearingFailed: 2,
      chainCaseFailed: 1,
      brakeDiscBent: 1,
    },
  },
  {
    symptom: 'brakesPoor',
    gate: BIKE,
    somethingElse: 6,
    of100: {
      brakePadsGone: 22,
      brakeAirBoiled: 22,
      brakeFluidLost: 14,
      caliperSeized: 8,
      brakePadsOiled: 7,
      brakeIced: 5,
      masterPassing: 5,
      brakeCableOrRod: 4,
      brakeDiscBent: 4,
      wheelBearingWorn: 3,
    },
  },
]

const STEERING_SHARES: ShareList[] = [
  {
    symptom: 'steeringLoose',
    gate: FOUR_WHEELS,
    somethingElse: 6,
    of100: {
      tieRodBent: 23,
      ballJointLoose: 17,
      wheelBearingWorn: 9,
      armBroken: 9,
      wheelLoose: 8,
      shockBroken: 8,
      steeringPostLoose: 6,
      steeringAssistFault: 6,
      steeringAssistSupply: 4,
      tyrePunctured: 4,
    },
  },
  {
    symptom: 'steeringLoose',
    gate: SLED,
    somethingElse: 10,
    of100: {
      skiBent: 22,
      tieRodBent: 17,
      armBroken: 13,
      ballJointLoose: 12,
      shockBroken: 9,
      steeringPostLoose: 9,
      skiRunnerWorn: 8,
    },
  },
  {
    symptom: 'steeringLoose',
    gate: BIKE,
    somethingElse: 8,
    of100: {
      forkTwisted: 24,
      shockBroken: 16,
      headBearingLoose: 15,
      wheelBearingWorn: 14,
      wheelLoose: 10,
      tyrePunctured: 8,
      swingArmLoose: 5,
    },
  },
]

const TYRE_SHARES: ShareList[] = [
  {
    symptom: 'tyreFlat',
    gate: FOUR_WHEELS,
    somethingElse: 6,
    of100: { tyrePunctured: 46, tyreBeadOff: 19, tyreTorn: 12, valveLeaking: 11, rimBent: 6 },
  },
  {
    symptom: 'tyreFlat',
    gate: BIKE,
    somethingElse: 6,
    of100: {
      tyrePunctured: 44,
      tubePinched: 28,
      valveLeaking: 11,
      tyreTorn: 5,
      rimBent: 3,
      tyreBeadOff: 3,
    },
  },
]

const TRACK_SHARES: ShareList[] = [
  {
    symptom: 'trackOff',
    gate: SLED,
    somethingElse: 6,
    of100: {
      trackFrozen: 28,
      trackOffIdlers: 14,
      trackJammed: 9,
      slidesMelted: 9,
      trackTorn: 8,
      idlerWheelLost: 7,
      driveBearingFailed: 6,
      skidBroken: 6,
      parkBrakeDragging: 3,
      caliperSeized: 2,
      chainCaseFailed: 2,
    },
  },
]

export const CHASSIS_SHARES: ShareList[] = [
  ...BRAKE_SHARES,
  ...STEERING_SHARES,
  ...TYRE_SHARES,
  ...TRACK_SHARES,
]
