import type { FailureItem } from '@/lib/model/code-book'
import { FIGURES, STANDARD } from './failure-sources'

/**
 * Failure kinds 0 to 14 (SAE J1939-73 Appendix A, ISO 11783-12 Annex E). `byRole`: of 100 faults of
 * that role in the circuit, how many set this kind. Kinds 0, 1 and 15 to 18 carry a believed signal,
 * the rest speak of the line. A coil switched on its ground side makes kind 3 when its primary is
 * shorted, its control wire touches supply or the driver cannot pull down; open or unplugged, kind 5.
 */
export const FMI_LINE: FailureItem[] = [
  {
    kind: 'failure',
    id: 'fmi0',
    fmi: 0,
    name: 'reading valid but above normal, most severe level',
    failure: 'highSevere',
    firstThought: 'Believe the signal first: look at the thing it measures.',
    byRole: { part: 1, wiring: 1, supply: 1, driver: 1, sensor: 3, mechanism: 6 },
    otherwise: 0.6,
    supports: 'The signal is believed; the thing it measures may truly be too high.',
    arguesAgainst:
      'Argues against a plain broken wire, which the module would report as volts or current.',
    doesNotProve:
      'It does not prove the thing truly too high: a sensor that reads high does the same. Measure the thing itself.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi1',
    fmi: 1,
    name: 'reading valid but below normal, most severe level',
    failure: 'lowSevere',
    firstThought: 'Believe the signal first: look at the thing it measures.',
    byRole: { part: 1, wiring: 1, supply: 6, driver: 1, sensor: 4, mechanism: 22 },
    otherwise: 0.8,
    supports:
      'The signal is believed; the thing it measures may truly be too low: a weak pump, a blocked filter, a low supply.',
    arguesAgainst:
      'Argues against a plain broken wire, which the module would report as volts or current.',
    doesNotProve:
      'It does not prove the thing truly too low: a sensor that reads low does the same. Measure the thing itself.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi2',
    fmi: 2,
    name: 'data erratic, intermittent or incorrect',
    failure: 'erratic',
    firstThought: 'Loose pin or chafed wire before the part.',
    byRole: { part: 4, wiring: 13, supply: 6, driver: 4, sensor: 12, mechanism: 4 },
    otherwise: 0.5,
    supports:
      'Supports a loose pin, a chafed wire, wet plugs or interference; then the part itself.',
    arguesAgainst: 'Argues against a clean, lasting open or short.',
    doesNotProve:
      'It does not prove the sensor bad: a loose pin or a chafed wire makes the same jumps, and may be quiet while you look.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi3',
    fmi: 3,
    name: 'voltage above normal, or shorted to a high source',
    failure: 'voltHigh',
    firstThought:
      'Shorted part, wire touching supply, lost sensor ground, or the driver: four suspects, not one.',
    byRole: { part: 22, wiring: 19, supply: 2, driver: 28, sensor: 15, mechanism: 1 },
    otherwise: 0.4,
    supports:
      'Supports a shorted winding or a driver that cannot pull the line down, a control or signal wire touching a supply wire, a lost ground or reference on a sensor.',
    arguesAgainst:
      'Argues against a coil or pump that is unplugged or open (that is kind 5) and against a lost supply (the line would read low).',
    doesNotProve:
      'It does not prove a short in the part: a wire touching supply, a lost sensor ground, an open wire on a pulled-up input or the driver read the same.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi4',
    fmi: 4,
    name: 'voltage below normal, or shorted to a low source',
    failure: 'voltLow',
    firstThought: 'Wire to ground, or supply missing.',
    byRole: { part: 10, wiring: 15, supply: 30, driver: 16, sensor: 15, mechanism: 1 },
    otherwise: 0.6,
    supports:
      'Supports a lost or low supply, a wire rubbed through to the frame, a driver stuck on, a signal shorted to ground.',
    arguesAgainst: 'Argues against a wire touching a supply wire.',
    doesNotProve:
      'It does not prove a short in the part: a wire rubbed through to metal, a lost supply or the driver read the same.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi5',
    fmi: 5,
    name: 'current below normal, or open circuit',
    failure: 'currentLow',
    firstThought: 'Unplugged, broken wire, or open winding.',
    byRole: { part: 24, wiring: 24, supply: 16, driver: 14, sensor: 8, mechanism: 1 },
    otherwise: 0.4,
    supports:
      'Supports an unplugged coil, injector or pump, a broken wire or pin, an open winding, a lost supply.',
    arguesAgainst:
      'Argues against a shorted winding or a wire to ground: those draw more current, not less.',
    doesNotProve:
      'It does not prove the part open: a pin pushed back, a broken wire or a plug left off read the same.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi6',
    fmi: 6,
    name: 'current above normal, or grounded circuit',
    failure: 'currentHigh',
    firstThought: 'Shorted winding, or wire to ground.',
    byRole: { part: 20, wiring: 10, supply: 1, driver: 14, sensor: 6, mechanism: 2 },
    otherwise: 0.3,
    supports:
      'Supports a shorted winding, or a control wire rubbed through to ground or supply, or a driver that has failed shorted.',
    arguesAgainst:
      'Argues against anything unplugged, broken or without supply: no current flows there.',
    doesNotProve:
      'It does not prove the part shorted: a wire rubbed through to metal behind the driver draws the same current.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi7',
    fmi: 7,
    name: 'mechanical system not responding or out of adjustment',
    failure: 'mechanical',
    firstThought: 'It was told to move and did not.',
    byRole: { part: 4, wiring: 1, supply: 1, driver: 1, sensor: 2, mechanism: 22 },
    otherwise: 0.5,
    supports:
      'Supports something that was told to move and did not: stuck, frozen, dirty, out of adjustment, blocked.',
    arguesAgainst: 'Argues against the wiring, which the module would report as volts or current.',
    doesNotProve:
      'It does not prove the actuator bad: what it moves may be stuck, bent, iced or at the end of its travel.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi8',
    fmi: 8,
    name: 'abnormal frequency, pulse width or period',
    failure: 'frequency',
    firstThought: 'Air gap, trigger wheel, interference.',
    byRole: { part: 1, wiring: 4, supply: 1, driver: 1, sensor: 9, mechanism: 2 },
    otherwise: 0.4,
    supports:
      'Supports a bad air gap, a damaged trigger wheel, a loose sensor, interference on its cable.',
    arguesAgainst: 'Argues against a lasting open or short.',
    doesNotProve:
      'It does not prove the sensor bad: the gap, the toothed wheel, a poor ground or noise of the ignition spoil the same signal.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi9',
    fmi: 9,
    name: 'abnormal update rate',
    failure: 'updateRate',
    firstThought: 'A module is silent or slow on the network.',
    byRole: null,
    otherwise: 1,
    supports: null,
    arguesAgainst: null,
    doesNotProve:
      'It does not prove a module bad: one without power or ground, or with a loose plug, goes silent in the same way.',
    source: STANDARD,
  },
  {
    kind: 'failure',
    id: 'fmi10',
    fmi: 10,
    name: 'abnormal rate of change',
    failure: 'rateOfChange',
    firstThought: 'A jump faster than the thing can move: contact or sensor.',
    byRole: { part: 1, wiring: 5, supply: 1, driver: 1, sensor: 5, mechanism: 1 },
    otherwise: 0.4,
    supports:
      'Supports a loose contact or a sensor that jumps faster than the thing it measures can.',
    arguesAgainst: 'Argues against a lasting open or short.',
    doesNotProve:
      'It does not prove the sensor bad: a loose pin makes leaps too, and the thing itself may truly have changed that fast.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi11',
    fmi: 11,
    name: 'root cause not known',
    failure: 'unknownCause',
    firstThought: 'The module knows only that something failed.',
    byRole: null,
    otherwise: 1,
    supports: null,
    arguesAgainst: null,
    doesNotProve:
      'It does not say what is wrong: the module saw a fault and could not name its kind.',
    source: STANDARD,
  },
  {
    kind: 'failure',
    id: 'fmi12',
    fmi: 12,
    name: 'bad intelligent device or component',
    failure: 'badDevice',
    firstThought: 'Power and ground first, then the device.',
    byRole: { part: 4, wiring: 1, supply: 1, driver: 10, sensor: 4, mechanism: 1 },
    otherwise: 0.4,
    supports:
      'Supports the module or the part judging itself bad; power and ground to it come first.',
    arguesAgainst:
      'Argues against nothing with certainty: a bad supply makes good modules report themselves.',
    doesNotProve:
      'It does not prove the device bad: with poor power or ground it reports itself bad. Measure both at its plug first.',
    source: `${STANDARD}; ${FIGURES}`,
  },
  {
    kind: 'failure',
    id: 'fmi13',
    fmi: 13,
    name: 'out of calibration',
    failure: 'calibration',
    firstThought: 'A learning or adjusting procedure may be due.',
    byRole: null,
    otherwise: 1,
    supports: null,
    arguesAgainst: null,
    doesNotProve:
      'It does not prove a part bad: one fitted lately may only want to be learned or set.',
    source: STANDARD,
  },
  {
    kind: 'failure',
    id: 'fmi14',
    fmi: 14,
    name: 'special instructions',
    failure: 'special',
    firstThought: "Look it up in the machine's own data.",
    byRole: null,
    otherwise: 1,
    supports: null,
    arguesAgainst: null,
    doesNotProve:
      'It does not say what is wrong without the instructions that belong to it: they stand in the manual of the machine.',
    source: STANDARD,
  },
]
