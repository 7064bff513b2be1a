import type { SymptomItem } from '@/lib/model/code-book'
import { HARD_LOAD, KEY_OUT, ON_STAND, PINCH_TRACK } from './cautions-drive'
import { SLED } from './gates-drive'
import { OWN_WORDS } from './sources'

/** The complaint only snowmobiles have. */
export const TRACK_SYMPTOMS: SymptomItem[] = [
  {
    kind: 'symptom',
    id: 'trackOff',
    name: 'Track off, frozen or will not turn',
    gate: SLED,
    riderWords: [
      'track frozen',
      'track is stuck',
      'track will not turn',
      'frozen to the ground',
      'track came off',
      'track jumped',
      'track off the wheels',
      'track rubs',
      'track is crooked',
      'track torn',
      'track ripped',
      'thumping under the seat',
      'squeals underneath',
      'grinds in the tunnel',
      'smells of hot plastic',
      'slides gone',
      'lost a wheel from the suspension',
      'stick in the track',
      'belt smokes and it does not move',
      'sits low at the back',
    ],
    conditions: [
      {
        id: 'parkedInFrost',
        name: 'After standing in frost or slush',
        tells: {
          of100: { trackFrozen: 92, parkBrakeDragging: 36, caliperSeized: 10 },
          otherwise: 5,
        },
      },
      {
        id: 'stoppedDead',
        name: 'Stopped dead while riding',
        tells: {
          of100: {
            trackJammed: 80,
            trackOffIdlers: 46,
            driveBearingFailed: 36,
            skidBroken: 40,
            idlerWheelLost: 20,
            trackTorn: 26,
            chainCaseFailed: 42,
          },
          otherwise: 4,
        },
      },
      {
        id: 'thumpsOrRatchets',
        name: 'Thumps, ratchets or rubs with speed',
        tells: {
          of100: {
            trackTorn: 80,
            trackOffIdlers: 72,
            idlerWheelLost: 46,
            skidBroken: 36,
            chainCaseFailed: 40,
            driveBearingFailed: 20,
          },
          otherwise: 4,
        },
      },
      {
        id: 'squealsGrowls',
        name: 'Squeals or growls low in the tunnel',
        tells: {
          of100: {
            driveBearingFailed: 76,
            idlerWheelLost: 52,
            slidesMelted: 26,
            chainCaseFailed: 30,
          },
          otherwise: 5,
        },
      },
      {
        id: 'hotPlastic',
        name: 'Smell of hot plastic, slow on ice or hard snow',
        tells: {
          of100: { slidesMelted: 86, parkBrakeDragging: 12, driveBearingFailed: 12 },
          otherwise: 3,
        },
      },
      {
        id: 'hotBrakeSmell',
        name: 'Smell of hot brake, brake lamp on',
        tells: { of100: { parkBrakeDragging: 76, caliperSeized: 62 }, otherwise: 3 },
      },
      {
        id: 'afterLanding',
        name: 'After a hard landing, a stump or rocks',
        tells: {
          of100: {
            skidBroken: 82,
            idlerWheelLost: 46,
            trackOffIdlers: 42,
            trackTorn: 36,
            trackJammed: 26,
          },
          otherwise: 4,
        },
      },
      {
        id: 'crooked',
        name: 'Track stands to one side or hangs',
        tells: {
          of100: { trackOffIdlers: 86, skidBroken: 46, idlerWheelLost: 40, trackTorn: 16 },
          otherwise: 3,
        },
      },
    ],
    opens: 'suspects',
    engine: 'runs',
    cautions: [KEY_OUT, PINCH_TRACK, HARD_LOAD, ON_STAND],
    firstLook: ['iceLook', 'trackLook', 'slideLook', 'parkBrakeLook'],
    twoWrongOf100: 10,
    source: `${OWN_WORDS}; two wrong in 10 of 100: a lost wheel and a track off (guess)`,
  },
]
