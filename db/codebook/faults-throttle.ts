import { fault } from './draft'
import type { FaultData } from './fault-data'

/** Why a throttle does not come back. */
export const THROTTLE_FAULTS: FaultData[] = [
  fault({
    id: 'throttleCableSticks',
    name: 'Throttle cable frayed, rusted or kinked',
    system: 'throttleSystem',
    gate: { electronicThrottle: ['no'] },
    repair: {
      words:
        'Fit a new cable, route it as the old one was, set free play, try it with bars both ways.',
      doesNotFix: 'Oil frees a dry cable for a day; a frayed one catches again.',
      minutes: 40,
      part: 'throttleCable',
      setups: ['tankCoverOff', 'throttleHousingOpen'],
      successOf100: 94,
    },
    onset: 'Creeps up: stiff, then slow to return; after mud, washing or a winter.',
    wayOut: 'repairHere',
    limpRefused: 'Throttle does not snap shut by itself: no ride.',
    provedBy:
      'Snaps shut from any place with bars left, straight and right; then a slow proof run.',
  }),
  fault({
    id: 'throttleCableTight',
    name: 'Throttle cable pulled by the bars, no free play',
    system: 'throttleSystem',
    gate: { electronicThrottle: ['no'] },
    repair: {
      words:
        'Route it clear of the steering head, set 2 to 5 mm of slack unless the maker says else.',
      doesNotFix: 'Does not cure a cable that is frayed inside.',
      minutes: 15,
      setups: ['tankCoverOff'],
      successOf100: 95,
    },
    onset: 'After work on bars or cables, or a winch or bag tied over them; revs rise in a turn.',
    wayOut: 'repairHere',
    limpRefused: 'Revs rise when the bars turn: no ride before it is put right.',
    provedBy: 'Slack stays with bars hard left and hard right; idle the same in both.',
  }),
  fault({
    id: 'throttleIced',
    name: 'Ice in throttle, slide or cable',
    system: 'throttleSystem',
    repair: {
      words:
        'Engine off. Warm throttle body and cable with hands or a warm bottle, blow the water out, dry and grease lightly.',
      doesNotFix: 'Comes back on the same day if the water stays in cable or box.',
      minutes: 20,
      successOf100: 82,
    },
    onset:
      'Below freezing after washing, powder snow or parking warm; carburettor air just above zero.',
    wayOut: 'repairHere',
    limpRefused: 'Throttle does not snap shut by itself: no ride.',
    provedBy: 'Snaps shut cold after ten minutes outside, ten times in a row.',
  }),
  fault({
    id: 'slideStuck',
    name: 'Slide or throttle plate stuck with dirt',
    system: 'throttleSystem',
    repair: {
      words:
        'Engine off, box open. Clean slide or plate and its shaft, look for grit or a bent edge, no file, no oil inside.',
      doesNotFix: 'A worn slide or shaft sticks again.',
      minutes: 35,
      costMinor: 250,
      part: 'carburettorKit',
      setups: ['airboxOpen'],
      successOf100: 88,
    },
    onset: 'After dust past the filter, old gummy fuel or a hard knock on the carburettor.',
    wayOut: 'repairHere',
    limpRefused: 'Throttle does not snap shut by itself: no ride.',
    provedBy: 'Drops shut by its own spring from every place; then a slow proof run.',
  }),
  fault({
    id: 'gripBinds',
    name: 'Throttle grip or thumb lever binds',
    system: 'throttleSystem',
    repair: {
      words:
        'Open the housing, clean out mud or ice, straighten or change it, leave a gap at the bar end, tighten evenly.',
      doesNotFix: 'Does not cure a cable that sticks below.',
      minutes: 20,
      part: 'gripHousing',
      setups: ['throttleHousingOpen'],
      successOf100: 92,
    },
    onset: 'After a fall on the bar end, new grips or hand guards, mud, or a glove caught.',
    wayOut: 'repairHere',
    limpRefused: 'Throttle does not snap shut by itself: no ride.',
    provedBy: 'Grip or lever snaps back by itself, bars both ways, gloves on.',
  }),
  fault({
    id: 'throttleSpringBroken',
    name: 'Throttle return spring broken or off',
    system: 'throttleSystem',
    repair: {
      words: 'Hook it on or fit a spring of the same kind. No rubber band, no wire instead.',
      doesNotFix: 'Does not cure a stiff cable.',
      minutes: 25,
      part: 'throttleSpring',
      setups: ['tankCoverOff'],
      successOf100: 95,
    },
    onset: 'Sudden: lever goes limp and revs stay up.',
    wayOut: 'tow',
    limpRefused: 'No return spring: no ride, however slow.',
    provedBy: 'Plate or slide snaps shut by itself with the cable slack.',
  }),
  fault({
    id: 'pedalBlocked',
    name: 'Pedal held down by mat, mud, ice or load',
    system: 'throttleSystem',
    gate: { kind: ['sideBySide'] },
    repair: {
      words:
        'Clear the foot well, take the mat out, free and oil the pivot, tie loads away from it.',
      doesNotFix: 'Does not cure a sensor or cable that sticks.',
      minutes: 6,
      successOf100: 96,
    },
    onset: 'Sudden, with mud, snow or a bag in the foot well.',
    wayOut: 'repairHere',
    limpRefused: 'Pedal does not come back by itself: no ride.',
    provedBy: 'Pedal comes up by itself from the floor, ten times.',
  }),
]
