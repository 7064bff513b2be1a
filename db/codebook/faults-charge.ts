import { fault } from './draft'
import type { FaultData } from './fault-data'
import { WITH_BATTERY } from './gates-charge'

/** What keeps a running engine from charging its battery, or charges it to death. */
export const CHARGE_FAULTS: FaultData[] = [
  fault({
    id: 'statorFault',
    name: 'Stator winding open, shorted or to ground',
    system: 'chargeSystem',
    circuits: [
      { circuit: 'chargingSystem', role: 'part' },
      { circuit: 'systemVoltage', role: 'supply' },
    ],
    repair: {
      words:
        'Shop job: stator and cover gasket. Mend its cable here if it only chafed outside the cover.',
      doesNotFix:
        'Does not cure the regulator or the brown plug that cooked it: prove both before it runs again.',
      minutes: 75,
      costMinor: 1500,
      part: 'statorUnit',
      setups: ['statorCoverOff'],
      successOf100: 90,
    },
    onset: 'Weeks of weaker starts, worse hot; often after a burnt plug or much extra load.',
    wayOut: 'limpOut',
    limpRefused:
      'Energy sum short, or a battery at or below 11.9 V at rest: no limp-out. Burnt wire: no ride at all.',
    provedBy:
      'Three legs alike in ohms and AC volts, none to ground, charge volts in limits hot; then the proof run.',
  }),
  fault({
    id: 'regulatorDead',
    name: 'Regulator/rectifier open: no or weak charge',
    system: 'chargeSystem',
    circuits: [
      { circuit: 'chargingSystem', role: 'part' },
      { circuit: 'systemVoltage', role: 'supply' },
    ],
    repair: {
      words:
        'Fit a regulator of the same kind on bare clean metal with its screws tight, fins in the wind, plugs cleaned.',
      doesNotFix:
        'A plug that has gone brown kills the next one. A dead battery will not take charge either.',
      minutes: 25,
      part: 'regulatorUnit',
      setups: ['sidePanelOff'],
      successOf100: 91,
    },
    onset: 'All at once after a hot day, mud on its fins, a jump start or a battery put in wrong.',
    wayOut: 'limpOut',
    limpRefused:
      'Energy sum short, or a battery at or below 11.9 V at rest: no limp-out. Burnt wire: no ride at all.',
    provedBy: 'Charge volts in limits with lights off and on, cold and hot; then the proof run.',
  }),
  fault({
    id: 'regulatorFailed',
    name: 'Regulator shorted inside: blows fuse or drains',
    system: 'chargeSystem',
    circuits: [
      { circuit: 'chargingSystem', role: 'part' },
      { circuit: 'systemVoltage', role: 'supply' },
    ],
    repair: {
      words:
        'Unplug it, wrap the ends. Then one fuse of the same rating, and a regulator of the same kind.',
      doesNotFix: 'Unplugged it charges nothing: the ride is on the battery alone.',
      minutes: 28,
      costMinor: 100,
      part: 'regulatorUnit',
      setups: ['sidePanelOff'],
      successOf100: 90,
    },
    onset:
      'Main fuse blown or battery flat overnight; after a jump start the wrong way round, or heat.',
    wayOut: 'limpOut',
    limpRefused:
      'Fuse blows again with it unplugged, or burnt wire: no ride. Energy sum short: no limp-out.',
    provedBy: 'Fuse whole, no draw with the key off, charge volts in limits; then the proof run.',
  }),
  fault({
    id: 'regulatorOvercharges',
    name: 'Regulator lets too many volts through',
    system: 'chargeSystem',
    gate: WITH_BATTERY,
    circuits: [
      { circuit: 'chargingSystem', role: 'driver' },
      { circuit: 'systemVoltage', role: 'driver' },
    ],
    repair: {
      words:
        'Stop charging at once: key off, unplug the regulator, fit a good one, clean its ground. Test the battery.',
      doesNotFix: 'A battery boiled dry or swollen is scrap, and so are bulbs that blew.',
      minutes: 25,
      part: 'regulatorUnit',
      setups: ['sidePanelOff'],
      successOf100: 90,
    },
    onset: 'Bulbs blow, smell of rotten eggs, battery hot or swollen; dash shows high volts.',
    wayOut: 'limpOut',
    limpRefused:
      'Swollen, hissing or hot battery, above all a lithium one: no ride, keep away from it.',
    provedBy: 'Never above the upper limit at any engine speed, battery cool after the proof run.',
  }),
  fault({
    id: 'chargingPlugBurnt',
    name: 'Charging plug burnt or loose',
    system: 'chargeSystem',
    circuits: [
      { circuit: 'chargingSystem', role: 'wiring' },
      { circuit: 'systemVoltage', role: 'wiring' },
    ],
    repair: {
      words:
        'Cut out the brown part; crimp new pins or join each wire with a sealed splice of full thickness.',
      doesNotFix:
        'Pushing it together lasts a day. Prove stator and regulator: one of them may have heated it.',
      minutes: 30,
      costMinor: 600,
      part: 'connectorKit',
      setups: ['sidePanelOff'],
      successOf100: 89,
    },
    onset: 'Comes and goes for weeks, smell of hot plastic; mud or water in the plug.',
    wayOut: 'repairHere',
    limpRefused:
      'Plug smokes or wires touch: battery off, no ride before it is parted and wrapped.',
    provedBy: 'At most 0.2 V lost over the joint with lights on, and it stays cool to the hand.',
  }),
  fault({
    id: 'chargeFuseOpen',
    name: 'Charging fuse open, or its holder burnt',
    system: 'chargeSystem',
    gate: WITH_BATTERY,
    circuits: [
      { circuit: 'chargingSystem', role: 'supply' },
      { circuit: 'systemVoltage', role: 'wiring' },
    ],
    repair: {
      words:
        'Look for what blew it: rubbed wire, jump the wrong way, shorted regulator. One new fuse of the same rating.',
      doesNotFix:
        'A second fuse that blows means a short that is still there, often in the regulator: no third one.',
      minutes: 12,
      costMinor: 100,
      part: 'fuseSet',
      setups: ['seatOff'],
      successOf100: 82,
    },
    onset: 'All at once after winching, a jump the wrong way round, or a new battery put in.',
    wayOut: 'limpOut',
    limpRefused:
      'Fuse blows again, melted holder or burnt wire: no ride. Energy sum short: no limp-out.',
    provedBy: 'Charge volts in limits, fuse and holder cool with all loads on; then the proof run.',
  }),
  fault({
    id: 'loadTooGreat',
    name: 'More load than it makes: lamps, heat, slow ride',
    system: 'chargeSystem',
    gate: WITH_BATTERY,
    repair: {
      words: 'Switch off extra lamps, heated grips and winch, and ride or idle somewhat faster.',
      doesNotFix: 'Does not refill an empty battery in an hour: it needs a charger.',
      minutes: 6,
      successOf100: 86,
    },
    onset: 'Since lamps or heaters were added, after winching, or a day at walking pace.',
    wayOut: 'repairHere',
    provedBy: 'Charge volts in limits with the extra load off; battery at rest volts next morning.',
  }),
]
