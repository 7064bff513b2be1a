import { expect, test } from 'vitest'
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
  for (const model of DEMO_MODELS.filter((m) => m.features.battery === 'yes')) {
    expect(model.specSheet?.showCodes.steps.length).toBeGreaterThan(3)
    expect(model.specSheet?.showCodes.clearSteps[0]).toMatch(/^Record every code first/)
  }
})

test('[R4] all features of the demo models are known', () => {
  for (const model of DEMO_MODELS) expect(Object.keys(model.features).length).toBe(14)
})
