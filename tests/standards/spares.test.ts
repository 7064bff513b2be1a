import { describe, expect, it } from 'vitest'
import { buyInOrder, pipelineMean, spareStock, stockFigures } from '@/lib/diag/spares'
import { theValue } from './the-value'

const stock = (mean: number, service: number) => theValue(spareStock(mean, service))

describe('spares (Poisson, Palm)', () => {
  it('[STD] pipeline mean = demand rate x resupply time (notes on METRIC, seen)', () => {
    expect(pipelineMean(0.1, 20)).toEqual({ ok: true, value: expect.closeTo(2, 12) })
    expect(pipelineMean(-0.1, 20)).toMatchObject({ problem: { field: 'demandPerDay' } })
  })
  it.each([
    [0.5, 1, 2, 3],
    [1, 2, 3, 4],
    [2, 4, 5, 6],
    [5, 8, 9, 11],
    [10, 14, 15, 18],
  ])('[STD] mean %f: 90, 95 and 99 %% need %i, %i and %i', (mean, at90, at95, at99) => {
    expect([0.9, 0.95, 0.99].map((s) => stock(mean, s))).toEqual([at90, at95, at99])
  })
  it.each([0, 0.5, 3, 40])('[R25] ends for a service of all, mean %d', (mean) => {
    const all = stock(mean, 1)
    expect(all).toBeGreaterThanOrEqual(stock(mean, 0.999999))
    expect(all).toBeLessThan(mean + 20 * Math.sqrt(mean) + 30)
  })
  it.each([
    [1, [1, 0.36788, 0.10364, 0.02334, 0.00435]],
    [2, [2, 1.13534, 0.54134, 0.21802, 0.07514]],
  ])('[STD] expected back-orders at mean %i, stock 0 to 4', (mean, ebo) => {
    expect([0, 1, 2, 3, 4].map((s) => theValue(stockFigures(s, mean)).backOrders)).toEqual(
      ebo.map((x) => expect.closeTo(x, 5)),
    )
  })
  it('[STD] fill rate at mean 1, stock 0 to 4: 0, 0.36788, 0.73576, 0.91970, 0.98101', () => {
    expect([0, 1, 2, 3, 4].map((s) => theValue(stockFigures(s, 1)).fillRate)).toEqual(
      [0, 0.36788, 0.73576, 0.9197, 0.98101].map((x) => expect.closeTo(x, 5)),
    )
  })
  it('[A3] the service level of the smallest stock is enough and that of one less is not', () => {
    const s = stock(5, 0.95)
    expect(theValue(stockFigures(s, 5)).serviceLevel).toBeGreaterThanOrEqual(0.95)
    expect(theValue(stockFigures(s - 1, 5)).serviceLevel).toBeLessThan(0.95)
  })
  it('[STD] marginal analysis of CHECKS 4.7: B six times, A, B, A; back-orders and money as worked', () => {
    const parts = [
      { id: 'A', mean: 1, costMinor: 5 },
      { id: 'B', mean: 4, costMinor: 1 },
    ]
    const bought = theValue(buyInOrder(parts, 17))
    expect(bought.map((p) => p.id).join('')).toBe('BBBBBBABA')
    expect(bought.slice(5).map(({ backOrders, spentMinor }) => [backOrders, spentMinor])).toEqual([
      [expect.closeTo(1.1954, 4), 6],
      [expect.closeTo(0.5633, 4), 11],
      [expect.closeTo(0.4526, 4), 12],
      [expect.closeTo(0.1884, 4), 17],
    ])
  })
  it('[A3] buys nothing without money or need, and names a price of nought', () => {
    expect(buyInOrder([{ id: 'A', mean: 1, costMinor: 5 }], 4)).toEqual({ ok: true, value: [] })
    expect(buyInOrder([{ id: 'A', mean: 0, costMinor: 5 }], 400)).toEqual({ ok: true, value: [] })
    expect(buyInOrder([{ id: 'A', mean: 1, costMinor: 0 }], 4)).toMatchObject({
      problem: { kind: 'below', field: 'A.costMinor' },
    })
    expect(spareStock(1, 1.2)).toMatchObject({ problem: { kind: 'above', field: 'service' } })
    expect(stockFigures(1.5, 1)).toMatchObject({ problem: { field: 'stock' } })
    expect(stockFigures(Number.NaN, 1)).toMatchObject({ problem: { field: 'stock' } })
  })
})
