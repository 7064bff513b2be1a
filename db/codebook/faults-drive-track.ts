import { fault } from './draft'
import type { FaultData } from './fault-data'
import { SLED } from './gates-drive'

const TOW_SLED =
  'On a tow: belt off, sled on a deck or skis, or track free; the spec sheet says how.'

/** Track, slides, wheels in the tunnel and the shaft that drives them. */
export const TRACK_FAULTS: FaultData[] = [
  fault({
    id: 'trackOffIdlers',
    name: 'Track off its wheels, or far too slack',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words:
        'Raise it, slacken the axle, lever the track back, set slack and line on both sides alike.',
      doesNotFix: 'A bent rail or a lost wheel throws it again.',
      minutes: 45,
      setups: ['endRaised'],
      successOf100: 82,
    },
    onset: 'Ratchets under power, then jams in a turn or on rocks.',
    wayOut: 'repairHere',
    limpRefused: 'A track off its wheels cuts the tunnel and the coolers.',
    provedBy: 'Runs in line for a minute raised, slack of the spec sheet; then the proof run.',
  }),
  fault({
    id: 'trackFrozen',
    name: 'Track frozen or packed with ice',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words:
        'Lay it on its side or lift the rear, knock and thaw the ice out, rock it by hand until it turns.',
      doesNotFix: 'Throttle does not free it: it burns the belt.',
      minutes: 25,
      costMinor: 20,
      successOf100: 92,
    },
    onset: 'Parked warm in slush, then frost.',
    wayOut: 'repairHere',
    limpRefused: 'It does not move until it is free.',
    provedBy: 'Turns by hand all the way round, then runs a minute raised.',
  }),
  fault({
    id: 'trackJammed',
    name: 'Stick, stone or rope in the track',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words:
        'Key out, turn the track backwards by hand, cut or lever the thing out, look for damage.',
      doesNotFix: 'A torn window catches the next one.',
      minutes: 20,
      successOf100: 93,
    },
    onset: 'Stopped dead or with a bang on thin snow or at a fence.',
    wayOut: 'repairHere',
    limpRefused: 'Driven on, it tears the track or the tunnel.',
    provedBy: 'Turns by hand all the way round; then the proof run.',
  }),
  fault({
    id: 'trackTorn',
    name: 'Track torn, lugs or clips gone',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words: 'Cut loose flaps away so that nothing catches; a track is a shop job.',
      doesNotFix: 'Tape and wire do not hold in a track.',
      minutes: 180,
      part: 'trackUnit',
      setups: ['skidOut'],
      successOf100: 92,
    },
    onset: 'Thumps with speed, pieces on the trail.',
    wayOut: 'tow',
    limpRefused: `A track that parts locks or flies. ${TOW_SLED}`,
    provedBy: 'Whole track in line; then the proof run.',
  }),
  fault({
    id: 'slidesMelted',
    name: 'Slides melted or worn through',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words:
        'Cool them with snow, scrape the clips, ride where there is loose snow; new slides at the shop.',
      doesNotFix: 'Snow once is not enough on ice: stop and cool them often.',
      minutes: 50,
      part: 'slideSet',
      setups: ['endRaised'],
      successOf100: 85,
    },
    onset: 'Hard icy trail, no snow dust; smell of hot plastic.',
    wayOut: 'limpOut',
    provedBy: 'Slides thick enough, no smell after the proof run on hard snow.',
  }),
  fault({
    id: 'driveBearingFailed',
    name: 'Track drive shaft bearing failed',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words: 'Shop job: bearing, seal and whatever it cut.',
      doesNotFix: 'Grease does not bring balls back.',
      minutes: 120,
      part: 'driveBearing',
      setups: ['skidOut'],
      successOf100: 90,
    },
    onset: 'Growls and squeals low in the tunnel, smells hot.',
    wayOut: 'tow',
    limpRefused: `The shaft walks into brake, cooler or track. ${TOW_SLED}`,
    provedBy: 'No play, quiet, hand-warm after the proof run.',
  }),
  fault({
    id: 'idlerWheelLost',
    name: 'Idler wheel lost or seized',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words: 'Move a less needed wheel to its place, bolt tight; take a seized one off.',
      doesNotFix: 'Without both rear wheels the track does not stay in line.',
      minutes: 30,
      costMinor: 50,
      part: 'idlerWheel',
      setups: ['endRaised'],
      successOf100: 82,
    },
    onset: 'Rattle or squeal, a wheel seen on the trail.',
    wayOut: 'repairHere',
    limpRefused: 'A rear wheel missing lets the track walk off.',
    provedBy: 'All wheels turn, track in line; then the proof run.',
  }),
  fault({
    id: 'skidBroken',
    name: 'Rear suspension arm, rail or shaft broken',
    system: 'trackSystem',
    gate: SLED,
    repair: {
      words:
        'Strap the rails so that the track clears, only to load it up; arms and rails at the shop.',
      doesNotFix: 'A bolt of another grade shears again.',
      minutes: 120,
      part: 'skidArm',
      setups: ['skidOut'],
      successOf100: 85,
    },
    onset: 'Landed hard or hit a stump; sits low or askew.',
    wayOut: 'tow',
    limpRefused: `Broken suspension part: no ride. ${TOW_SLED}`,
    provedBy: 'Rails straight, bolts tight after the proof run.',
  }),
]
