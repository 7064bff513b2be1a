import type { SymptomItem } from '@/lib/model/code-book'
import { NO_STEERING, ON_STAND } from './cautions-drive'
import { RIDDEN } from './gates-drive'
import { OWN_WORDS } from './sources'

/** The complaint of steering and suspension. */
export const STEERING_SYMPTOMS: SymptomItem[] = [
  {
    kind: 'symptom',
    id: 'steeringLoose',
    name: 'Steering or suspension loose, bent or heavy',
    gate: RIDDEN,
    riderWords: [
      'steering loose',
      'steering has play',
      'bars are crooked',
      'bars do not point straight',
      'steering wheel is off',
      'pulls to one side',
      'wheel wobbles',
      'wheel leans',
      'wheel fell off',
      'heavy steering',
      'power steering gone',
      'hit a rock and it steers wrong',
      'hit a stump',
      'bent tie rod',
      'bent ski',
      'darts to one side',
      'knocks in front',
      'bottoms out',
      'sits low on one corner',
      'shock broken',
      'does not turn in',
      'front end shakes',
    ],
    conditions: [
      {
        id: 'afterHit',
        name: 'After a hit, a fall or a hard landing',
        tells: {
          of100: {
            tieRodBent: 82,
            armBroken: 82,
            skiBent: 84,
            forkTwisted: 90,
            shockBroken: 46,
            ballJointLoose: 30,
            steeringPostLoose: 36,
          },
          otherwise: 10,
        },
      },
      {
        id: 'barsCrooked',
        name: 'Bars crooked when going straight',
        tells: {
          of100: {
            tieRodBent: 76,
            forkTwisted: 84,
            skiBent: 52,
            armBroken: 42,
            steeringPostLoose: 56,
          },
          otherwise: 5,
        },
      },
      {
        id: 'wobble',
        name: 'Wobbles or shakes with speed',
        tells: {
          of100: {
            wheelLoose: 76,
            wheelBearingWorn: 62,
            headBearingLoose: 52,
            ballJointLoose: 36,
            swingArmLoose: 56,
            tyrePunctured: 32,
            shockBroken: 16,
          },
          otherwise: 8,
        },
      },
      {
        id: 'knocks',
        name: 'Knocks or clonks over bumps',
        tells: {
          of100: {
            ballJointLoose: 66,
            headBearingLoose: 62,
            shockBroken: 46,
            wheelBearingWorn: 36,
            armBroken: 40,
            swingArmLoose: 46,
            wheelLoose: 46,
            steeringPostLoose: 36,
          },
          otherwise: 7,
        },
      },
      {
        id: 'growls',
        name: 'Growls or grinds with speed',
        tells: { of100: { wheelBearingWorn: 74, wheelLoose: 20 }, otherwise: 3 },
      },
      {
        id: 'heavy',
        name: 'Heavy to turn, or a steering lamp is on',
        tells: {
          of100: {
            steeringAssistFault: 90,
            steeringAssistSupply: 92,
            tyrePunctured: 36,
            headBearingLoose: 22,
            ballJointLoose: 14,
            steeringPostLoose: 16,
          },
          otherwise: 4,
        },
      },
      {
        id: 'pulls',
        name: 'Pulls or darts to one side',
        tells: {
          of100: {
            skiBent: 72,
            tieRodBent: 56,
            tyrePunctured: 70,
            armBroken: 42,
            skiRunnerWorn: 26,
          },
          otherwise: 8,
        },
      },
      {
        id: 'bounces',
        name: 'Bounces, bottoms or sits low',
        tells: { of100: { shockBroken: 86, armBroken: 30, tyrePunctured: 26 }, otherwise: 4 },
      },
      {
        id: 'pushesOn',
        name: 'Runs straight on in turns',
        tells: { of100: { skiRunnerWorn: 88, skiBent: 20, tyrePunctured: 22 }, otherwise: 6 },
      },
      {
        id: 'afterWheelWork',
        name: 'Since a wheel or the bars were off',
        tells: {
          of100: { wheelLoose: 42, steeringPostLoose: 26, headBearingLoose: 20, tieRodBent: 6 },
          otherwise: 4,
        },
      },
    ],
    opens: 'suspects',
    engine: 'runs',
    cautions: [NO_STEERING, ON_STAND],
    firstLook: ['frontLook', 'barRock', 'nutsFeel', 'forkSight', 'runnerFeel'],
    twoWrongOf100: 10,
    source: `${OWN_WORDS}; two wrong in 10 of 100: one hit bends more than one part (guess)`,
  },
]
