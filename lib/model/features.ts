import * as z from 'zod/mini'

/** Every feature a machine can have and the values it can take (rule R4). Gates name these words. */
export const FEATURES = {
  kind: ['atv', 'sideBySide', 'snowmobile', 'dirtBike', 'smallEngine'],
  strokes: ['two', 'four'],
  fuelling: ['carburettor', 'injection'],
  battery: ['yes', 'no'],
  primesAtKeyOn: ['yes', 'no'],
  coilType: ['inductive', 'capacitive'],
  cooling: ['air', 'liquid', 'snow'],
  drive: ['belt', 'chain', 'shaft'],
  neutral: ['yes', 'no'],
  electricStart: ['yes', 'no'],
  handStart: ['recoil', 'kick', 'none'],
  electronicThrottle: ['yes', 'no'],
  steeringAssist: ['yes', 'no'],
  cylinders: ['one', 'two', 'more'],
} as const

export const FEATURE_NAMES = Object.keys(FEATURES) as FeatureName[]
export type FeatureName = keyof typeof FEATURES

/** What is known of one machine. A missing key means "not known", which widens every list. */
export const features = z.partial(
  z.strictObject({
    kind: z.enum(FEATURES.kind),
    strokes: z.enum(FEATURES.strokes),
    fuelling: z.enum(FEATURES.fuelling),
    battery: z.enum(FEATURES.battery),
    primesAtKeyOn: z.enum(FEATURES.primesAtKeyOn),
    coilType: z.enum(FEATURES.coilType),
    cooling: z.enum(FEATURES.cooling),
    drive: z.enum(FEATURES.drive),
    neutral: z.enum(FEATURES.neutral),
    electricStart: z.enum(FEATURES.electricStart),
    handStart: z.enum(FEATURES.handStart),
    electronicThrottle: z.enum(FEATURES.electronicThrottle),
    steeringAssist: z.enum(FEATURES.steeringAssist),
    cylinders: z.enum(FEATURES.cylinders),
  }),
)
export type Features = z.infer<typeof features>

/** A gate: for each feature it names, the values it allows. An empty gate is open to every machine. */
export const gate = z.partialRecord(
  z.enum(FEATURE_NAMES as [FeatureName, ...FeatureName[]]),
  z.array(z.string()).check(z.minLength(1)),
)
export type Gate = z.infer<typeof gate>
