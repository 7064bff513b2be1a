import type { LimpRefusal, LimpUnjudged, SaidByHand, WayOutNotice } from '@/lib/diag/way-out'
import type { Caution } from '@/lib/model/code-book'
import type { WayOut } from '@/lib/model/job'
import type { LeftBehindLine } from '@/lib/shop/way-out-states'
import { unitLabel } from '../reading-strip/unit-words'

/** Cautions of each way out; common practice, no source. The maker's manual and local rules come first. */
export const WAY_CAUTIONS: Record<WayOut, readonly Caution[]> = {
  repairHere: [
    {
      signal: 'WARNING',
      text: 'Try the brakes before speed. Ride a short loop near help first, with somebody watching.',
    },
  ],
  limpOut: [
    {
      signal: 'WARNING',
      text: 'Ride slowly, with a second machine, and turn back at the time you set. Stop at any new noise, smell or lamp.',
    },
  ],
  tow: [
    {
      signal: 'WARNING',
      text: 'Nobody within one and a half times the length of a tight line, and never downhill of the machine. No shock pulls, no knots, a damper on the line.',
    },
  ],
  returnLater: [
    {
      signal: 'WARNING',
      text: 'People first: warm, counted, together, with a way to call. Then leave the machine.',
    },
    {
      signal: 'CAUTION',
      text: 'Fuel tap shut, key out, no leak, off the track and off the ice, marked so that others see it.',
    },
  ],
}

export const SAID_WORDS: Record<SaidByHand, string> = {
  noBrake: 'No working brake',
  loose: 'Steering or suspension part loose',
  fuelLeak: 'Fuel leak',
  burntWiring: 'Burnt wiring',
  fluidLost: 'Coolant or oil lost',
  knock: 'Knock or metal noise',
  unfit: 'Rider not fit to ride',
}

/** The same in the line of reasons that goes into the log. */
export const SAID_SHORT: Record<SaidByHand, string> = {
  noBrake: 'no working brake',
  loose: 'steering or suspension loose',
  fuelLeak: 'fuel leak',
  burntWiring: 'burnt wiring',
  fluidLost: 'coolant or oil lost',
  knock: 'knock',
  unfit: 'rider not fit',
}

const CAUSE_UNKNOWN = {
  two: 'Cause not known on a two-stroke: running weak it seizes.',
  notKnown: 'Cause not known, and it is not on record that this is a four-stroke.',
} as const

/** One reason against a limp out, as it stands on the screen. */
export function refusalWords(refusal: LimpRefusal): string {
  switch (refusal.kind) {
    case 'said':
      return `${SAID_WORDS[refusal.what]}.`
    case 'hurt':
      return 'Somebody is hurt.'
    case 'emptyBattery':
      return `Battery empty: ${refusal.asTyped} ${unitLabel('dcVoltage', refusal.unit)} at rest, ${refusal.emptyAtVolts} V or less counts as empty (flooded lead-acid, table credited to the battery makers’ trade body).`
    case 'causeUnknown':
      return CAUSE_UNKNOWN[refusal.strokes]
    case 'faultForbids':
      return `${refusal.name}: ${refusal.bookWords}`
  }
}

/** What could not be judged yet, after "Not judged:". */
export const UNJUDGED_WORDS: Record<LimpUnjudged, string> = {
  battery: 'whether a reading says that the battery is empty',
  cause: 'whether the cause is known',
  faults: 'whether a likely fault forbids the ride',
}

export const NOTICE_WORDS: Record<WayOutNotice, string> = {
  noFix: 'No fix is on record.',
  noProofRun: 'No proof run is on record.',
  faultInProofRun: 'The fault came in the last proof run: the repair is not proved.',
  examineFirst: 'Water or a rollover went before: have it examined before it is ridden again.',
}

/** What a machine left behind still lacks, said above the key. */
export const LACKS_WORDS = {
  place: 'A machine left behind needs a position on the job.',
  photo: 'A machine left behind needs a photo in the log.',
  lines: 'A machine left behind needs every line above.',
} as const

export const LEFT_WORDS: Record<LeftBehindLine, string> = {
  key: 'Where the key is',
  tap: 'Fuel tap and leaks',
  secured: 'How it is secured and marked',
  land: 'Whose land or gate',
  fetch: 'Fetch by, and weather until then',
}
