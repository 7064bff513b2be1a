import type { SymptomItem } from '@/lib/model/code-book'
import { BATTERY_GAS } from './cautions'
import { BOILING_BATTERY, UNPLUGGED_RUNS } from './cautions-charge'
import { WITH_BATTERY } from './gates-charge'
import { OWN_WORDS } from './sources'
import { told } from './told'

/** The complaint of a battery that is not charged, or boiled. */
export const CHARGE_SYMPTOMS: SymptomItem[] = [
  {
    kind: 'symptom',
    id: 'noCharge',
    name: 'Does not charge',
    gate: WITH_BATTERY,
    riderWords: [
      'not charging',
      'does not charge',
      'battery light on',
      'battery lamp on',
      'battery keeps going flat',
      'battery goes dead while riding',
      'new battery and still dead',
      'needs a jump every time',
      'low voltage on the dash',
      'voltage drops while riding',
      'volts show 11',
      'stator gone',
      'regulator gone',
      'lights go dim',
      'lights get brighter and dimmer',
      'bulbs keep blowing',
      'overcharging',
      'battery boils',
      'smells of rotten eggs',
      'smell of burnt plastic under the seat',
      'heated grips stopped',
      'high voltage warning',
    ],
    conditions: [
      told('lowVoltsRunning', 'Dash shows low volts or the battery lamp while it runs', 30, {
        statorFault: 72,
        regulatorFailed: 74,
        chargingPlugBurnt: 66,
        mainFuseOpen: 50,
        loadTooGreat: 44,
        groundPoor: 40,
        batteryFailed: 14,
        parasiticDrain: 2,
        regulatorOvercharges: 2,
      }),
      told('highVoltsRunning', 'Dash shows high volts, bulbs blow or flare', 2, {
        regulatorOvercharges: 86,
        batteryTerminalLoose: 12,
        groundPoor: 9,
        batteryFailed: 6,
      }),
      told('flatAfterStanding', 'Flat after standing, well while it runs', 8, {
        parasiticDrain: 88,
        batteryFailed: 68,
        batteryTerminalLoose: 18,
        mainFuseOpen: 3,
      }),
      told('slowOrLoaded', 'Only at walking pace, or with lamps, heaters or winch on', 6, {
        loadTooGreat: 86,
        statorFault: 22,
        batteryFailed: 14,
        chargingPlugBurnt: 14,
      }),
      told('burntPlastic', 'Smell of hot plastic or a hot plug', 3, {
        chargingPlugBurnt: 62,
        regulatorFailed: 14,
        statorFault: 12,
        regulatorOvercharges: 10,
        mainFuseOpen: 12,
        keySwitchHarness: 14,
      }),
      told('rottenEggs', 'Smell of rotten eggs, battery wet, hot or swollen', 2, {
        regulatorOvercharges: 68,
        batteryFailed: 20,
      }),
      told('withBumps', 'Comes and goes with bumps or the bars', 5, {
        batteryTerminalLoose: 66,
        keySwitchHarness: 62,
        groundPoor: 48,
        chargingPlugBurnt: 46,
        mainFuseOpen: 12,
        regulatorFailed: 4,
      }),
      told('onlyWhenHot', 'Charges cold, stops when hot', 5, {
        statorFault: 46,
        regulatorFailed: 36,
        chargingPlugBurnt: 26,
      }),
      told('sinceJumpStart', 'Since a jump start, a new battery, winching or welding', 7, {
        mainFuseOpen: 66,
        regulatorFailed: 34,
        regulatorOvercharges: 22,
        batteryTerminalLoose: 34,
        loadTooGreat: 26,
      }),
      told('newBatteryNoHelp', 'A new battery went flat as well', 26, {
        statorFault: 46,
        regulatorFailed: 46,
        chargingPlugBurnt: 44,
        parasiticDrain: 52,
        loadTooGreat: 42,
        batteryFailed: 2,
      }),
      told('afterMudWater', 'After deep water or mud', 10, {
        chargingPlugBurnt: 36,
        regulatorFailed: 20,
        groundPoor: 34,
        batteryFailed: 4,
      }),
    ],
    opens: 'suspects',
    cautions: [BOILING_BATTERY, BATTERY_GAS, UNPLUGGED_RUNS],
    firstLook: ['batteryCaseLook', 'chargingPlugLook', 'chargeFuseLook', 'extraLoadLook'],
    twoWrongOf100: 12,
    source: `${OWN_WORDS}; two wrong in 12 of 100: a battery and what emptied it, a plug and what heated it (guess)`,
  },
]
