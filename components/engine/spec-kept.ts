import type { SpecSheet, SpecValue } from '@/lib/model/machine-model'

/**
 * A spec sheet cut to what the engine reads: figures and prices, no prose, in rows, so that it fits into
 * one kept advice (16 kB). The engine is always asked with the sheet made from these rows, so what was
 * kept recomputes to the same values by construction (rule R23).
 */
export type SpecKept = {
  /** Component, value, quantity, unit, nominal, tolerance %, low, high, part temperature, material. */
  values: [
    string,
    string,
    SpecValue['quantity'],
    string,
    number | null,
    number | null,
    number | null,
    number | null,
    number | null,
    SpecValue['material'],
  ][]
  /** Part, genuine price, aftermarket price, fails of 100 of each. */
  parts: [string, number, number | null, number, number | null][]
}

/** The rows of a sheet; components without a figure are left out. */
export function keptSpec(spec: SpecSheet): SpecKept {
  return {
    values: spec.components.flatMap(({ id, values }) =>
      values.map((v): SpecKept['values'][number] => [
        id,
        v.id,
        v.quantity,
        v.unit,
        v.nominal,
        v.tolerancePercent,
        v.low,
        v.high,
        v.partTempC,
        v.material,
      ]),
    ),
    parts: spec.parts.map((p): SpecKept['parts'][number] => [
      p.part,
      p.genuineMinor,
      p.aftermarketMinor,
      p.genuineFailsOf100,
      p.aftermarketFailsOf100,
    ]),
  }
}

/** The sheet as the engine is asked with it: the same figures, every word empty. */
export function specOfKept(kept: SpecKept): SpecSheet {
  const ids = [...new Set(kept.values.map(([component]) => component))]
  return {
    showCodes: { steps: [], clearSteps: [], source: '' },
    components: ids.map((id) => ({
      id,
      name: '',
      place: '',
      setups: [],
      fasteners: null,
      connector: null,
      pins: [],
      torqueNm: null,
      values: kept.values.filter(([component]) => component === id).map(valueOfRow),
      source: '',
    })),
    cutOut: null,
    engagementRpm: null,
    massKg: null,
    towPreparation: null,
    parts: kept.parts.map(([part, genuineMinor, aftermarketMinor, genuine, aftermarket]) => ({
      part,
      genuineNumber: '',
      genuineMinor,
      aftermarketNumber: null,
      aftermarketMinor,
      genuineFailsOf100: genuine,
      aftermarketFailsOf100: aftermarket,
      source: '',
    })),
    demo: false,
  }
}

function valueOfRow(row: SpecKept['values'][number]): SpecValue {
  const [, id, quantity, unit, nominal, tolerancePercent, low, high, partTempC, material] = row
  return {
    id,
    name: '',
    quantity,
    unit,
    nominal,
    tolerancePercent,
    low,
    high,
    partTempC,
    material,
    conditions: null,
    source: '',
  }
}

/** The sheet every question to the engine carries; null stays null. */
export const specForEngine = (spec: SpecSheet | null): SpecSheet | null =>
  spec === null ? null : specOfKept(keptSpec(spec))
