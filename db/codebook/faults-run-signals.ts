import { fault } from './draft'
import type { FaultData } from './fault-data'

/** Sensors, throttle by wire, key and network: what a module misses or does not believe. */
export const RUN_SIGNAL_FAULTS: FaultData[] = [
  fault({
    id: 'camSensorBad',
    name: 'Cam position sensor or its cable',
    system: 'timingSystem',
    gate: { fuelling: ['injection'], strokes: ['four'] },
    circuits: [{ circuit: 'camSensor', role: 'sensor' }],
    repair: {
      words:
        'Clean and seat the plug, mend the cable away from heat; fit a sensor if it sends nothing.',
      doesNotFix: 'Does not cure a cam chain that has jumped: both set the same code.',
      minutes: 25,
      part: 'camSensorUnit',
      setups: ['sidePanelOff'],
      successOf100: 90,
    },
    onset: 'Long cranking, then starts; hot more than cold; after oil got into the plug.',
    wayOut: 'limpOut',
    limpRefused: 'It may not start again: do not stop the engine on the way out.',
    provedBy: 'Pulses at every turn hot and cold, starts at once ten times; then the proof run.',
  }),
  fault({
    id: 'securityRefuses',
    name: 'Key or tether not recognised',
    system: 'safetySystem',
    gate: { battery: ['yes'] },
    circuits: [{ circuit: 'security', role: 'sensor' }],
    repair: {
      words:
        'Take other keys and metal off the ring, clean the tether post, use the second key; then have the key matched anew.',
      doesNotFix: 'A by-pass is no cure and is not ours to fit.',
      minutes: 6,
      part: 'codedKey',
      successOf100: 75,
    },
    onset: 'New key, key beside another coded one, low battery, wet tether post.',
    wayOut: 'repairHere',
    limpRefused: 'Do not stop the engine on the way out: it may not start again.',
    provedBy: 'Security lamp goes out at key on ten times out of ten; then the proof run.',
  }),
  fault({
    id: 'gripSensorsDisagree',
    name: 'Throttle grip sensor tracks disagree',
    system: 'wireThrottleSystem',
    gate: { electronicThrottle: ['yes'] },
    circuits: [{ circuit: 'gripSensor', role: 'sensor' }],
    repair: {
      words:
        'Free and dry the grip or pedal, seat its plug, mend the cable at the bar; fit the unit if a track is worn.',
      doesNotFix: 'Clearing the code does not cure a worn track.',
      minutes: 30,
      part: 'gripUnit',
      setups: ['frontCoverOff'],
      successOf100: 88,
    },
    onset:
      'Wet or frozen grip, a fall on the bar, or over bumps; then idle only or a cap on speed.',
    wayOut: 'limpOut',
    limpRefused: 'Power that comes or goes by itself: no ride.',
    provedBy:
      'Both tracks move together from stop to stop while the bar is turned; then the proof run.',
  }),
  fault({
    id: 'throttleActuatorBad',
    name: 'Throttle actuator or its plate sticking',
    system: 'wireThrottleSystem',
    gate: { electronicThrottle: ['yes'] },
    circuits: [
      { circuit: 'throttleActuator', role: 'part' },
      { circuit: 'throttleSensor', role: 'sensor' },
    ],
    repair: {
      words:
        'Key off: clean the bore and plate, thaw it, seat the plug, let the module learn the stops again.',
      doesNotFix: 'Does not cure a grip sensor or a low battery, which shut the plate as well.',
      minutes: 35,
      costMinor: 150,
      part: 'throttleBodyUnit',
      setups: ['airboxOpen'],
      successOf100: 82,
    },
    onset: 'Dirt, ice or oil mist in the bore; cold mornings; after the air box was open.',
    wayOut: 'limpOut',
    limpRefused: 'A plate that hangs open: no start, no ride.',
    provedBy: 'Plate follows the grip both ways without a step; then the proof run.',
  }),
  fault({
    id: 'speedSensorBad',
    name: 'Vehicle speed sensor or its wire',
    system: 'signalSystem',
    gate: { fuelling: ['injection'] },
    circuits: [{ circuit: 'vehicleSpeed', role: 'sensor' }],
    repair: {
      words:
        'Clean iron dust off the tip, set it home, mend the wire; fit a sensor if it sends nothing.',
      doesNotFix: 'Does not cure a broken tone ring or another size of tyre.',
      minutes: 20,
      part: 'speedSensorUnit',
      successOf100: 91,
      withoutPartOf100: 30,
    },
    onset: 'Brush or ice tore the wire; speed on the dash dead or jumping.',
    wayOut: 'limpOut',
    provedBy: 'Dash speed is steady on a slow ride over bumps; then the proof run.',
  }),
  fault({
    id: 'networkFault',
    name: 'Network between the modules',
    system: 'signalSystem',
    gate: { fuelling: ['injection'] },
    circuits: [
      { circuit: 'network', role: 'wiring' },
      { circuit: 'controlModule', role: 'wiring' },
    ],
    repair: {
      words:
        'Find the wet, loose or rubbed plug on the pair; dry, clean and seat it; mend both wires with their twist.',
      doesNotFix: 'One module that shorts the pair has to be found by unplugging them in turn.',
      minutes: 45,
      costMinor: 200,
      part: 'connectorKit',
      setups: ['frontCoverOff', 'seatOff'],
      successOf100: 78,
    },
    onset:
      'After water, a fitted accessory, or a rub at the steering head; several modules complain at once.',
    wayOut: 'limpOut',
    limpRefused: 'Steering assist or throttle that drops out while riding: no ride.',
    provedBy: 'About 60 ohm on the pair, no new network codes over rough ground.',
  }),
  fault({
    id: 'airTempSensorBad',
    name: 'Intake air temperature sensor',
    system: 'signalSystem',
    gate: { fuelling: ['injection'] },
    circuits: [{ circuit: 'airTempSensor', role: 'sensor' }],
    repair: {
      words:
        'Put its plug back, clean the pins, fit a sensor. It often sits in the air box or with the pressure sensor.',
      doesNotFix: 'Does not cure heat soak, which goes away once it moves.',
      minutes: 12,
      part: 'airTempUnit',
      setups: ['seatOff'],
      successOf100: 93,
    },
    onset:
      'Plug left off after filter work; rich when it says too cold, lean when it says too hot.',
    wayOut: 'limpOut',
    limpRefused: 'Two-stroke running lean: no ride, it seizes.',
    provedBy: 'Reads the air of the day with the engine cold; then the proof run.',
  }),
  fault({
    id: 'oxygenSensorBad',
    name: 'Oxygen sensor or its heater',
    system: 'signalSystem',
    gate: { fuelling: ['injection'] },
    circuits: [
      { circuit: 'oxygenSensor', role: 'sensor' },
      { circuit: 'oxygenHeater', role: 'part' },
    ],
    repair: {
      words:
        'Mend the burnt wire, seat the plug, fit a sensor. Unplugged, most engines run on a fixed mixture.',
      doesNotFix: 'Does not cure an exhaust leak ahead of it, which makes it read lean.',
      minutes: 20,
      part: 'oxygenUnit',
      successOf100: 90,
    },
    onset: 'Wire melted on the pipe, a rock strike, silicone spray or leaded fuel.',
    wayOut: 'limpOut',
    provedBy: 'Steady idle and clean plug with it plugged in and warm; then the proof run.',
  }),
]
