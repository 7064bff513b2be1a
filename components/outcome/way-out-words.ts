import type { Caution } from '@/lib/model/code-book'
import type { JobMachineState, PeopleState, WayOut } from '@/lib/model/job'

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

export const MACHINE_AFTER: Record<WayOut, JobMachineState> = {
  repairHere: 'runs',
  limpOut: 'limping',
  tow: 'onTow',
  returnLater: 'leftBehind',
}

export const PEOPLE_AFTER: Record<WayOut, PeopleState> = {
  repairHere: 'onTheWay',
  limpOut: 'onTheWay',
  tow: 'onTheWay',
  returnLater: 'onTheWay',
}
