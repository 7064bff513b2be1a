import type { SymptomItem } from '@/lib/model/code-book'
import { BEAD_JUMPS, HOT_BRAKE, NO_BRAKES, ON_STAND } from './cautions-drive'
import { RIDDEN, WHEELED } from './gates-drive'
import { OWN_WORDS } from './sources'

/** Complaints of brakes and of tyres. */
export const BRAKE_AND_TYRE_SYMPTOMS: SymptomItem[] = [
  {
    kind: 'symptom',
    id: 'brakesPoor',
    name: 'No or poor brakes, or a brake that drags',
    gate: RIDDEN,
    riderWords: [
      'no brakes',
      'brakes do not work',
      'brake goes to the bar',
      'pedal goes to the floor',
      'soft brake',
      'spongy lever',
      'lever sinks',
      'have to pump the brake',
      'brakes fade',
      'brakes faded downhill',
      'does not stop',
      'brake squeals',
      'brake grinds',
      'metal on metal',
      'brake is stuck on',
      'brake drags',
      'brake smells hot',
      'brake fluid on the wheel',
      'wet brakes',
      'brakes iced up',
      'pulls to one side when braking',
    ],
    conditions: [
      {
        id: 'toTheBar',
        name: 'Lever or pedal goes all the way',
        tells: {
          of100: {
            brakeFluidLost: 84,
            brakeAirBoiled: 56,
            masterPassing: 46,
            brakeCableOrRod: 72,
            brakePadsGone: 20,
            brakeDiscBent: 14,
            wheelBearingWorn: 26,
          },
          otherwise: 4,
        },
      },
      {
        id: 'spongy',
        name: 'Soft, better when pumped',
        tells: {
          of100: {
            brakeAirBoiled: 74,
            brakeFluidLost: 36,
            masterPassing: 50,
            wheelBearingWorn: 46,
            brakeDiscBent: 42,
            brakePadsGone: 22,
          },
          otherwise: 6,
        },
      },
      {
        id: 'firmNoBite',
        name: 'Firm lever, but it does not stop',
        tells: {
          of100: {
            brakeIced: 80,
            brakePadsOiled: 86,
            brakePadsGone: 40,
            caliperSeized: 46,
            chainCaseFailed: 72,
          },
          otherwise: 5,
        },
      },
      {
        id: 'scrapes',
        name: 'Grinds or scrapes',
        tells: {
          of100: {
            brakePadsGone: 74,
            caliperSeized: 30,
            brakeDiscBent: 40,
            wheelBearingWorn: 40,
            driveBearingFailed: 62,
            brakeIced: 18,
          },
          otherwise: 6,
        },
      },
      {
        id: 'dragsHot',
        name: 'Drags, smells or gets hot',
        tells: {
          of100: {
            caliperSeized: 76,
            parkBrakeDragging: 82,
            brakeDiscBent: 20,
            brakeAirBoiled: 22,
            driveBearingFailed: 40,
          },
          otherwise: 5,
        },
      },
      {
        id: 'afterLongDescent',
        name: 'On a long descent',
        tells: {
          of100: {
            brakeAirBoiled: 52,
            parkBrakeDragging: 26,
            caliperSeized: 22,
            brakePadsGone: 20,
          },
          otherwise: 8,
        },
      },
      {
        id: 'afterWater',
        name: 'After water, mud, snow or frost',
        tells: {
          of100: { brakeIced: 90, parkBrakeDragging: 26, brakePadsGone: 24 },
          otherwise: 12,
        },
      },
      {
        id: 'wetWithFluid',
        name: 'Something wet or oily at the brake',
        tells: { of100: { brakeFluidLost: 66, brakePadsOiled: 66 }, otherwise: 5 },
      },
      {
        id: 'afterBrakeWork',
        name: 'Since the brake was worked on',
        tells: {
          of100: {
            brakeAirBoiled: 36,
            brakePadsOiled: 26,
            brakeCableOrRod: 18,
            wheelSpeedSensorBad: 18,
          },
          otherwise: 6,
        },
      },
      {
        id: 'pulses',
        name: 'Lever pulses, or a brake lamp is on',
        tells: {
          of100: { brakeDiscBent: 66, wheelSpeedSensorBad: 82, wheelBearingWorn: 20 },
          otherwise: 4,
        },
      },
    ],
    opens: 'suspects',
    engine: 'runs',
    cautions: [NO_BRAKES, HOT_BRAKE],
    firstLook: ['leverHold', 'fluidLook', 'padLook', 'parkBrakeLook', 'brakeLinkLook'],
    twoWrongOf100: 8,
    source: `${OWN_WORDS}; two wrong in 8 of 100: worn pads and a stuck caliper (guess)`,
  },
  {
    kind: 'symptom',
    id: 'tyreFlat',
    name: 'Tyre flat or off the rim',
    gate: WHEELED,
    riderWords: [
      'flat tyre',
      'flat',
      'puncture',
      'tyre went down',
      'tyre is soft',
      'loses air',
      'tyre came off the rim',
      'off the bead',
      'nail in the tyre',
      'stick in the tyre',
      'side wall cut',
      'tyre ripped',
      'valve broken',
      'pinch flat',
      'bent rim',
      'will not hold air',
    ],
    conditions: [
      {
        id: 'atOnce',
        name: 'Flat at once',
        tells: {
          of100: {
            tyreBeadOff: 90,
            tyreTorn: 92,
            tubePinched: 82,
            rimBent: 46,
            tyrePunctured: 34,
            valveLeaking: 24,
          },
          otherwise: 40,
        },
      },
      {
        id: 'slowly',
        name: 'Slowly, over minutes or days',
        tells: {
          of100: {
            valveLeaking: 72,
            tyrePunctured: 60,
            rimBent: 46,
            tubePinched: 14,
            tyreBeadOff: 6,
            tyreTorn: 4,
          },
          otherwise: 40,
        },
      },
      {
        id: 'hardEdge',
        name: 'Hit a rock, root or rut edge',
        tells: {
          of100: { tubePinched: 84, rimBent: 80, tyreTorn: 66, tyreBeadOff: 46, tyrePunctured: 12 },
          otherwise: 8,
        },
      },
      {
        id: 'sideLoad',
        name: 'In a side slope or a hard turn',
        tells: { of100: { tyreBeadOff: 70, tyreTorn: 12 }, otherwise: 6 },
      },
      {
        id: 'seesSomething',
        name: 'A nail, thorn or stick is in it',
        tells: { of100: { tyrePunctured: 52, tyreTorn: 14, valveLeaking: 4 }, otherwise: 3 },
      },
      {
        id: 'pumpedAndFlatAgain',
        name: 'Pumped up, flat again',
        tells: {
          of100: {
            tyrePunctured: 46,
            valveLeaking: 52,
            rimBent: 56,
            tubePinched: 26,
            tyreBeadOff: 14,
          },
          otherwise: 20,
        },
      },
    ],
    opens: 'suspects',
    engine: 'runs',
    cautions: [BEAD_JUMPS, ON_STAND],
    firstLook: ['tyreLook', 'valveWet', 'rimLook'],
    twoWrongOf100: 6,
    source: `${OWN_WORDS}; two wrong in 6 of 100: a bent rim and a bead off (guess)`,
  },
]
