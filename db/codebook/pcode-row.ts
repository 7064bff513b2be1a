/**
 * One standard code of SAE J2012 / ISO 15031-6 in our own words. `circuit` is null where the code names none;
 * `failure` is the item that says what kind it is; `differs` marks codes whose letter, number or subject each maker
 * of small machines puts to a part of its own (which sensor is B, which coil is C, what counts as a gear sensor).
 */
export type PcodeRow = readonly [
  code: string,
  name: string,
  circuit: string | null,
  failure: string,
  group: string,
  source: string,
  differs?: true,
]

/** Meaning checked against an open dataset after mending that set's one-row shift. */
export const SEEN =
  'SAE J2012 / ISO 15031-6; meaning checked against an open dataset after mending it; own words'
export const MEMORY = 'SAE J2012 / ISO 15031-6, from memory; own words'
