import { FEATURE_NAMES, type Features, type Gate } from '@/lib/model/features'

/**
 * Whether a gate lets a machine through (rule R4): `shut` when a known feature is not among the values
 * the gate allows, else `unknown` when a feature it names is not known, else `open`.
 * An unknown feature widens: callers treat it as open and ask for it first.
 */
export function opens(gate: Gate, features: Features): 'open' | 'shut' | 'unknown' {
  let unknown = false
  for (const name of FEATURE_NAMES) {
    const allowed = gate[name]
    if (allowed === undefined) continue
    const value = features[name]
    if (value === undefined) unknown = true
    else if (!allowed.includes(value)) return 'shut'
  }
  return unknown ? 'unknown' : 'open'
}

/** Whether a gate keeps its record in the list: open, or not known to be shut (rule R4). */
export const letsThrough = (gate: Gate, features: Features): boolean =>
  opens(gate, features) !== 'shut'
