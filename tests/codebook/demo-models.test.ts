import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { passes } from '@/db/codebook/book-problem'
import { DEMO_MODELS } from '@/db/codebook/demo-models'

const sheet = (model: string) => DEMO_MODELS.find((m) => m.model === model)?.specSheet

test('[R18] the coil of the demo model: 0.5 ohm, 10 %, at 20 C, copper', () => {
  const coil = sheet('Moor 450')?.components.find((c) => c.id === 'ignitionCoil1')
  expect(coil?.values.find((v) => v.id === 'primaryResistance')).toMatchObject({
    quantity: 'resistance',
    unit: 'ohm',
    nominal: 0.5,
    tolerancePercent: 10,
    partTempC: 20,
    material: 'copper',
  })
})

test('[R18] a break-even for the coil of 38.7 of 100: 2 of 100 plus (135 - 25) / 300', () => {
  const coil = sheet('Moor 450')?.parts.find((p) => p.part === 'ignitionCoil')
  const more = ((coil?.genuineMinor ?? 0) - (coil?.aftermarketMinor ?? 0)) / 30000
  expect((coil?.genuineFailsOf100 ?? 0) / 100 + more).toBeCloseTo(0.386667, 6)
})

test('[R18] every demo figure says it is invented, and each component says where it is', () => {
  for (const model of DEMO_MODELS) {
    expect(model.source).toBe('demo, invented')
    expect(model.specSheet?.demo).toBe(true)
    for (const c of model.specSheet?.components ?? []) {
      expect(c.place.length, c.id).toBeGreaterThan(10)
      for (const { source } of [c, ...c.values])
        expect(source).toMatch(/^demo manual, page \d+ \(invented\)$/)
    }
  }
})

test('[R11] every machine with codes says how they are shown and that they are recorded before clearing', () => {
  const withCodes = DEMO_MODELS.filter((m) => m.features.fuelling === 'injection')
  expect(withCodes.length).toBeGreaterThan(4)
  for (const model of withCodes) {
    expect(model.specSheet?.showCodes.steps.length).toBeGreaterThan(3)
    expect(model.specSheet?.showCodes.clearSteps[0]).toMatch(/^Record every code first/)
  }
})

test('[R4] all features of the demo models are known', () => {
  for (const model of DEMO_MODELS) expect(Object.keys(model.features).length).toBe(14)
})

test('[R18] ten models over all kinds, each on its own features; no two share a name or an id', () => {
  expect(DEMO_MODELS.length).toBeGreaterThanOrEqual(8)
  expect(new Set(DEMO_MODELS.map((m) => m.features.kind)).size).toBe(5)
  for (const of of [
    (m: (typeof DEMO_MODELS)[number]) => m.id,
    (m: (typeof DEMO_MODELS)[number]) => m.model,
  ])
    expect(new Set(DEMO_MODELS.map(of)).size).toBe(DEMO_MODELS.length)
  const features = DEMO_MODELS.map((m) => JSON.stringify(m.features))
  expect(new Set(features).size).toBe(DEMO_MODELS.length)
})

test('[R18] a sheet holds each component once, and nothing that its machine cannot have', () => {
  for (const { model, features, specSheet } of DEMO_MODELS) {
    const ids = specSheet?.components.map((c) => c.id) ?? []
    expect(new Set(ids).size, model).toBe(ids.length)
    expect(ids.includes('batteryMain'), model).toBe(features.battery === 'yes')
    expect(ids.includes('injector1'), model).toBe(features.fuelling === 'injection')
    expect(ids.includes('driveChain'), model).toBe(features.drive === 'chain')
    expect(specSheet?.cutOut, model).not.toBeNull()
    expect(specSheet?.massKg ?? 0, model).toBeGreaterThan(20)
    expect(specSheet?.towPreparation?.length ?? 0, model).toBeGreaterThan(30)
    expect(specSheet?.parts.length ?? 0, model).toBeGreaterThan(4)
  }
})

test('[R18] the sheets have the figures by which the checks of their machines are judged', () => {
  const judged = BOOK_ITEMS.flatMap((item) =>
    item.kind === 'check' && item.reading !== null ? [{ gate: item.gate, ...item.reading }] : [],
  )
  for (const { model, features, specSheet } of DEMO_MODELS) {
    const wanted = judged.filter(({ gate }) => passes(gate, features))
    const missing = wanted.filter(
      ({ component, value }) =>
        !specSheet?.components.some(
          (c) => c.id === component && c.values.some((v) => v.id === value),
        ),
    )
    const words = missing.map(({ component, value }) => `${component}/${value}`).join(', ')
    expect(missing.length, `${model}: ${words}`).toBeLessThanOrEqual(Math.max(1, wanted.length / 4))
  }
})

test('[R18] limits are the right way about, and a winding or a sensor says at which temperature', () => {
  for (const { model, specSheet } of DEMO_MODELS)
    for (const c of specSheet?.components ?? [])
      for (const v of c.values) {
        const at = `${model} ${c.id} ${v.id}`
        expect(v.low ?? Number.NEGATIVE_INFINITY, at).toBeLessThan(
          v.high ?? Number.POSITIVE_INFINITY,
        )
        expect(
          [v.nominal, v.low, v.high].some((x) => x !== null),
          at,
        ).toBe(true)
        expect(v.nominal === null || v.tolerancePercent !== null, at).toBe(true)
        if (v.material !== null) expect(v.partTempC, at).not.toBeNull()
      }
})
