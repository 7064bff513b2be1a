import type { FeatureItem } from '@/lib/model/code-book'
import { OWN_WORDS } from './sources'

type Row = readonly [id: string, name: string, question: string, answers: Record<string, string>]

const ROWS: readonly Row[] = [
  [
    'kind',
    'Kind of machine',
    'What is it: four wheels astride, side by side, snowmobile, dirt bike or a small engine?',
    {
      atv: 'ATV',
      sideBySide: 'Side-by-side',
      snowmobile: 'Snowmobile',
      dirtBike: 'Dirt bike',
      smallEngine: 'Small engine',
    },
  ],
  [
    'strokes',
    'Two or four strokes',
    'Does oil go into the fuel or an oil tank that is used up (two), or is there a dipstick (four)?',
    { two: 'Two-stroke', four: 'Four-stroke' },
  ],
  [
    'fuelling',
    'Carburettor or injection',
    'Is there a choke and a float bowl (carburettor), or an electric pump and an injector?',
    { carburettor: 'Carburettor', injection: 'Injection' },
  ],
  [
    'battery',
    'Battery',
    'Is a battery fitted? Look under the seat.',
    { yes: 'Has a battery', no: 'No battery' },
  ],
  [
    'primesAtKeyOn',
    'Pump primes at key on',
    'When it was well, did the fuel pump hum for two or three seconds at key on?',
    { yes: 'Primes at key on', no: 'Primes only while cranking' },
  ],
  [
    'coilType',
    'Kind of ignition coil',
    'Has the coil a feed from the key (inductive), or only one thin wire from the ignition box?',
    {
      inductive: 'Inductive, fed from the key',
      capacitive: 'Capacitive, fed from the ignition box',
    },
  ],
  [
    'cooling',
    'Cooling',
    'Is there a radiator, only fins, or a heat exchanger cooled by snow?',
    { air: 'Air', liquid: 'Liquid', snow: 'Liquid, cooled by snow' },
  ],
  [
    'drive',
    'Drive',
    'Does a belt, a chain or a shaft take the power to the wheels or track?',
    { belt: 'Belt', chain: 'Chain', shaft: 'Shaft' },
  ],
  [
    'neutral',
    'Neutral',
    'Is there a neutral to put it in?',
    { yes: 'Has neutral', no: 'No neutral' },
  ],
  [
    'electricStart',
    'Electric start',
    'Is there a start button?',
    { yes: 'Electric start', no: 'No electric start' },
  ],
  [
    'handStart',
    'Hand or foot start',
    'Is there a pull cord or a kick lever?',
    { recoil: 'Pull cord', kick: 'Kick lever', none: 'Neither' },
  ],
  [
    'electronicThrottle',
    'Electronic throttle',
    'Does a cable go from the lever to the throttle (no), or only wires (yes)?',
    { yes: 'Electronic throttle', no: 'Throttle by cable' },
  ],
  [
    'steeringAssist',
    'Steering assist',
    'Does a motor help the steering?',
    { yes: 'Steering assist', no: 'No steering assist' },
  ],
  [
    'cylinders',
    'Cylinders',
    'How many spark plugs side by side: one, two or more?',
    { one: 'One', two: 'Two', more: 'Three or more' },
  ],
]

/** The features that gate the book (rule R4), each with the question that finds it out in the field. */
export const FEATURE_ITEMS: FeatureItem[] = ROWS.map(([id, name, question, answers]) => ({
  kind: 'feature',
  id,
  name,
  question,
  answers,
  source: OWN_WORDS,
}))
