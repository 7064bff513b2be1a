import type { CheckItem } from '@/lib/model/code-book'
import { FUEL_PRESSURE, HIGH_VOLTAGE, KEY_OFF, MOVING_PARTS, VAPOUR } from './cautions'
import { PLUG_HOLE } from './cautions-run'
import { check } from './draft'
import { PRACTICE } from './sources'

/** A dripping injector, seen. */
export const INJECTOR_DRIP: CheckItem = check({
  id: 'injectorDrip',
  name: 'Injector tip under pressure',
  purpose: 'Finds an injector that drips when it should be shut.',
  gate: { fuelling: ['injection'] },
  setups: ['tankCoverOff', 'railRelieved', 'injectorOut'],
  tools: ['jar', 'lamp'],
  machineState: 'keyOn',
  minutes: 6,
  steps: [
    ['Key off. Injector on its line, tip over the jar, its plug off.', KEY_OFF],
    ['Plug caps off and away. Glasses on. Key on so that the pump runs once.', FUEL_PRESSURE],
    'Key off. Watch the tip for one minute.',
    'A wet tip is fine. A drop that falls is not.',
    'Refit with whole seals. Key on, look for leaks.',
  ],
  cautions: [FUEL_PRESSURE, VAPOUR, HIGH_VOLTAGE, MOVING_PARTS, PLUG_HOLE],
  record: 'Drops in a minute, each injector.',
  outcomes: [
    ['dry', 'Dry or just wet'],
    ['slow', 'One drop in a minute'],
    ['drips', 'Drips, or sprays'],
  ],
  table: { injectorLeaking: [8, 20, 72], injectorBlocked: [72, 20, 8] },
  otherwise: [92, 6, 2],
  expected: [{ words: 'No drop in a minute.', source: PRACTICE }],
  passDoesNotProve: 'It can hang open hot or dirty and be shut now.',
  stopWhen: 'Fuel on a hot part: key off, air it.',
  basis: 'physics',
  basisWords: 'You can see a drop. How often it hides is a guess.',
})
