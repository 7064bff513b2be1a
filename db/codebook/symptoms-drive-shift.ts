import type { SymptomItem } from '@/lib/model/code-book'
import { RIDDEN, WITH_NEUTRAL } from './gates-drive'
import { OWN_WORDS } from './sources'

/** The complaint of a lever or gear that does not obey. */
export const SHIFT_SYMPTOMS: SymptomItem[] = [
  {
    kind: 'symptom',
    id: 'willNotShift',
    name: 'Will not shift',
    gate: { ...RIDDEN, ...WITH_NEUTRAL },
    riderWords: [
      'will not shift',
      'will not go into gear',
      'stuck in gear',
      'stuck in park',
      'no reverse',
      'will not go into reverse',
      'cannot find neutral',
      'gear lever stuck',
      'lever flops around',
      'lever came loose',
      'grinds when I shift',
      'jumps out of gear',
      'only one gear works',
      'range lever will not move',
      'display shows the wrong gear',
      'gear lever frozen',
      'clutch lever does nothing',
    ],
    conditions: [
      {
        id: 'leverLoose',
        name: 'Lever moves too easily, nothing happens',
        tells: {
          of100: {
            shiftLinkageOff: 62,
            shiftReturnBroken: 58,
            shiftForkBent: 9,
            gearboxBroken: 10,
          },
          otherwise: 3,
        },
      },
      {
        id: 'leverStuck',
        name: 'Lever will not move at all',
        tells: {
          of100: {
            shiftFrozen: 82,
            parkOrRangeNotEngaged: 46,
            shiftLinkageOff: 22,
            gearboxBroken: 34,
            shiftForkBent: 22,
            clutchDriveStuck: 20,
          },
          otherwise: 8,
        },
      },
      {
        id: 'grindsRunning',
        name: 'Grinds or jumps with the engine running',
        tells: {
          of100: {
            idleTooHigh: 80,
            clutchDriveStuck: 68,
            clutchDrags: 76,
            beltSlips: 40,
            gearboxBroken: 36,
            shiftForkBent: 30,
            parkOrRangeNotEngaged: 26,
          },
          otherwise: 5,
        },
      },
      {
        id: 'engineOffIsFine',
        name: 'Shifts well with the engine off',
        tells: {
          of100: {
            idleTooHigh: 86,
            clutchDriveStuck: 62,
            clutchDrags: 84,
            beltSlips: 60,
            gearPositionBad: 42,
          },
          otherwise: 6,
        },
      },
      {
        id: 'oneGearOnly',
        name: 'One gear or range only, or jumps out',
        tells: {
          of100: {
            shiftForkBent: 72,
            gearboxBroken: 52,
            parkOrRangeNotEngaged: 30,
            shiftLinkageOff: 20,
            shiftReturnBroken: 24,
          },
          otherwise: 7,
        },
      },
      {
        id: 'displayWrong',
        name: 'Display wrong or blank, or locked out',
        tells: {
          of100: { gearPositionBad: 88, shiftLinkageOff: 16, parkOrRangeNotEngaged: 16 },
          otherwise: 3,
        },
      },
      {
        id: 'afterFrost',
        name: 'After frost, water or mud',
        tells: { of100: { shiftFrozen: 90, gearPositionBad: 26, clutchDrags: 16 }, otherwise: 9 },
      },
      {
        id: 'onSlope',
        name: 'Parked on a slope or pushed against something',
        tells: { of100: { parkOrRangeNotEngaged: 66, beltSlips: 12 }, otherwise: 7 },
      },
      {
        id: 'afterKnock',
        name: 'After a fall or a knock from below',
        tells: {
          of100: { shiftLinkageOff: 46, shiftForkBent: 14, gearPositionBad: 12 },
          otherwise: 6,
        },
      },
    ],
    opens: 'suspects',
    engine: 'runs',
    cautions: [
      {
        signal: 'WARNING',
        text: 'It can jump when a gear goes in at once. Brake on, nobody in front or behind, lever never forced.',
      },
    ],
    firstLook: [
      'rangeLever',
      'footLeverFeel',
      'shiftLinkLook',
      'clutchLeverFeel',
      'shiftEngineOff',
    ],
    twoWrongOf100: 5,
    source: `${OWN_WORDS}; two things wrong in 5 of 100 where nobody knows (common practice, no source)`,
  },
]
