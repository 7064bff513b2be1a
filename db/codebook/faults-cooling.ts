import { fault } from './draft'
import type { FaultData } from './fault-data'
import { AIR, COOLANT, FAN_SLED, RADIATOR, RADIATOR_FAN, SNOW } from './gates-charge'

/** What keeps heat in the engine. */
export const COOLING_FAULTS: FaultData[] = [
  fault({
    id: 'coolantLow',
    name: 'Coolant low: hose, clamp, seal or radiator leaks',
    system: 'coolingSystem',
    gate: COOLANT,
    circuits: [{ circuit: 'coolantLevel', role: 'mechanism' }],
    repair: {
      words:
        'Cold: tighten the clamp or cut the hose back, fill with the right mix, let the air out, run warm, fill again.',
      doesNotFix: 'Topping up does not stop a leak, and no water comes back by itself.',
      minutes: 25,
      costMinor: 1200,
      part: 'coolantHoseKit',
      setups: ['engineCold'],
      successOf100: 85,
    },
    onset: 'A stick, a rock or a loose clamp; sweet smell, wet streak, heater gone cold.',
    wayOut: 'repairHere',
    limpRefused: 'Coolant gone and no refill, or the leak not stopped: no ride.',
    provedBy: 'Holds cap pressure five minutes, level the same cold after the proof run.',
  }),
  fault({
    id: 'radiatorPacked',
    name: 'Radiator packed with mud, grass or ice',
    system: 'coolingSystem',
    gate: RADIATOR,
    repair: {
      words:
        'Let it cool, wash from the engine side out with a soft jet, or brush and blow; straighten bent fins.',
      doesNotFix: 'A hard jet close up lays the fins flat and makes it worse.',
      minutes: 18,
      setups: ['frontCoverOff'],
      successOf100: 90,
    },
    onset: 'Deep mud, seed heads or slush that day; hot at walking pace, cooler at speed.',
    wayOut: 'repairHere',
    provedBy:
      'Light shines through the core; fan goes on and off again at idle after the proof run.',
  }),
  fault({
    id: 'fanCircuitFault',
    name: 'Cooling fan, its relay, fuse or switch',
    system: 'coolingSystem',
    gate: RADIATOR_FAN,
    circuits: [{ circuit: 'fanControl', role: 'part' }],
    repair: {
      words:
        'Free the blades, clean the plug, fuse of the same rating, relay of the same kind; or feed the fan with a fused wire to ride out.',
      doesNotFix:
        'A fan that does not turn on direct feed needs a motor; a fuse that blows again means a short.',
      minutes: 22,
      costMinor: 300,
      part: 'fanUnit',
      setups: ['frontCoverOff'],
      successOf100: 84,
    },
    onset: 'Hot when slow or standing, well at speed; after deep water or mud.',
    wayOut: 'limpOut',
    limpRefused:
      'Gauge in the red or steam: cool it down first, then on the move and in short legs only.',
    provedBy: 'Fan starts and stops by itself at its temperatures, twice, at idle.',
  }),
  fault({
    id: 'thermostatStuck',
    name: 'Thermostat stuck shut',
    system: 'coolingSystem',
    gate: COOLANT,
    circuits: [{ circuit: 'coolantTempSensor', role: 'mechanism' }],
    repair: {
      words:
        'Cold: fit a thermostat with its seal, or take it out for the ride home; fill and let the air out.',
      doesNotFix: 'Without one it runs cold and may not cool better: it is for the ride out only.',
      minutes: 45,
      costMinor: 800,
      part: 'thermostatUnit',
      setups: ['engineCold', 'thermostatOpen'],
      successOf100: 88,
    },
    onset: 'Hot within minutes of a cold start, at any speed.',
    wayOut: 'tow',
    limpRefused: 'No flow through the radiator or exchanger: no ride until it is open or out.',
    provedBy:
      'Hose past it warms in one go at opening temperature; temperature steady on the proof run.',
  }),
  fault({
    id: 'coolantPumpFailed',
    name: 'Coolant pump: wheel, shaft, belt or seal',
    system: 'coolingSystem',
    gate: COOLANT,
    repair: {
      words: 'Shop job: shaft, seals and pump wheel, oil changed if coolant got in.',
      doesNotFix: 'More coolant does not help: what the pump does not move does not cool.',
      minutes: 110,
      costMinor: 2500,
      part: 'coolantPumpKit',
      setups: ['engineCold'],
      successOf100: 88,
    },
    onset: 'Drips below the pump for days, a whine, or hot at once under load.',
    wayOut: 'tow',
    limpRefused: 'No coolant moved, or oil and coolant mixed: no ride, no start.',
    provedBy:
      'Coolant seen moving with engine speed, dry below the pump, clean oil after the proof run.',
  }),
  fault({
    id: 'headGasketLeaking',
    name: 'Head gasket leaking or head warped',
    system: 'coolingSystem',
    gate: COOLANT,
    repair: {
      words:
        'Shop job: head off, faces measured for flatness, new gasket, tightened as the manual says.',
      doesNotFix: 'Sealers and retightening seldom hold, and the bearings suffer if oil is milky.',
      minutes: 240,
      costMinor: 5000,
      part: 'headGasketSet',
      setups: ['engineCold', 'tankCoverOff'],
      successOf100: 87,
    },
    onset:
      'After it once ran very hot; pushes coolant out of the bottle, white steam, hard hoses cold.',
    wayOut: 'tow',
    limpRefused:
      'Gas in the coolant or coolant in cylinder or oil: no ride; do not crank with a full cylinder.',
    provedBy: 'No bubbles, holds pressure, compression even; level the same after two warm-ups.',
  }),
  fault({
    id: 'snowCoolingStarved',
    name: 'Heat exchanger gets no snow: ice or hard ground',
    system: 'coolingSystem',
    gate: SNOW,
    repair: {
      words:
        'Into soft snow, or shovel snow onto tunnel and exchangers; ice scratchers down, slow speed on ice, pauses.',
      doesNotFix: 'Snow does not help if coolant is low: look when it is cold.',
      minutes: 12,
      successOf100: 90,
    },
    onset: 'Ice, road, spring crust or thin cover; slides hot too.',
    wayOut: 'repairHere',
    limpRefused: 'Gauge in the red: stop and cool it; slides that melt stop the track as well.',
    provedBy:
      'Temperature comes down within minutes in loose snow and stays there on the proof run.',
  }),
  fault({
    id: 'coolantCapLeaks',
    name: 'Pressure cap does not hold',
    system: 'coolingSystem',
    gate: COOLANT,
    repair: {
      words:
        'Cold: wipe seal and seat, or fit a cap of the same pressure; fill and let the air out.',
      doesNotFix: 'A stronger cap bursts hoses; it cures no leak.',
      minutes: 8,
      costMinor: 300,
      part: 'coolantCap',
      setups: ['engineCold'],
      successOf100: 90,
    },
    onset:
      'Boils and spits into the bottle though the gauge is barely up; higher country makes it worse.',
    wayOut: 'limpOut',
    limpRefused: 'Boils at light load: no ride before it is full and holds.',
    provedBy: 'Holds the pressure marked on it; hoses firm hot, level steady after the proof run.',
  }),
  fault({
    id: 'airInCoolant',
    name: 'Air locked in the cooling system',
    system: 'coolingSystem',
    gate: COOLANT,
    repair: {
      words:
        'Cold: front end high, fill slowly, open the bleed screws until no bubbles come, run warm, fill again.',
      doesNotFix: 'Air that comes back is gas from a head gasket or a leak on the pump side.',
      minutes: 22,
      costMinor: 500,
      setups: ['engineCold'],
      successOf100: 90,
    },
    onset: 'Since coolant was filled or a hose was off, or after it lay on its side.',
    wayOut: 'repairHere',
    limpRefused: 'Gauge swings into the red: no load before the air is out.',
    provedBy: 'Bleed screws run clear, gauge steady, level the same cold after the proof run.',
  }),
  fault({
    id: 'finsPacked',
    name: 'Cooling fins, cowl or air screen blocked',
    system: 'coolingSystem',
    gate: AIR,
    repair: {
      words:
        'Let it cool, scrape and brush the fins clean, clear screen and cowl, put every duct and seal back.',
      doesNotFix: 'Cold water on a hot cylinder can crack it: no hose before it is hand-warm.',
      minutes: 20,
      setups: ['engineCool', 'cowlOff'],
      successOf100: 90,
    },
    onset: 'Mud, chaff or snow dust; power fades on climbs, smell of hot paint.',
    wayOut: 'repairHere',
    provedBy: 'Fins bare down to the root, cowl whole; no fading on the proof run.',
  }),
  fault({
    id: 'fanBeltBroken',
    name: 'Cooling fan belt or fan broken',
    system: 'coolingSystem',
    gate: FAN_SLED,
    repair: {
      words: 'Fit the fan belt, set its slack as the manual says, look at fan, pulley and bearing.',
      doesNotFix: 'A bearing that drags breaks the next belt.',
      minutes: 30,
      part: 'fanBelt',
      setups: ['engineCool', 'cowlOff'],
      successOf100: 90,
    },
    onset: 'A slap, the howl of the fan is gone, then power fades within minutes.',
    wayOut: 'repairHere',
    limpRefused: 'No fan: no ride under load, it seizes in minutes.',
    provedBy:
      'Fan turns with the engine, belt holds its slack; plugs read right after the proof run.',
  }),
]
