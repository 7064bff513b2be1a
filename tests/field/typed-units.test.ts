import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { meaning } from '@/components/checks/saved-reading'
import { entryMention } from '@/components/log/entry-words'
import { ReadingLine } from '@/components/log/reading-line'
import { unitLabel } from '@/components/reading-strip/unit-words'
import { stripOfBody, stripSentence } from '@/components/reading-strip/verdict'
import { judge } from '@/lib/diag/reading'
import { inKeptUnit, unitsOf } from '@/lib/diag/typed-units'
import type { ReadingBody } from '@/lib/model/log-entry'
import { QUANTITIES, type Quantity } from '@/lib/model/meter-profile'
import { coilInput, specOf } from '../diag/fixtures/readings'

/** Every unit a figure may be typed in that is not the one it is kept in. */
const OTHER_UNITS = (Object.keys(QUANTITIES) as Quantity[]).flatMap((quantity) =>
  unitsOf(quantity)
    .slice(1)
    .map((unit) => ({ quantity, unit })),
)

function typed(quantity: Quantity, unitId: string, changes: Partial<ReadingBody> = {}) {
  const unit = unitsOf(quantity).find(({ id }) => id === unitId)
  if (!unit) throw new Error(`no unit ${unitId}`)
  const input = {
    ...coilInput,
    quantity,
    value: inKeptUnit(2.2, unit),
    overRange: changes.overRange ?? false,
    spec: specOf({ quantity, unit: QUANTITIES[quantity], low: 1, high: 3 }),
  }
  const { verdict, estimate, standardU, expandedU, conformance, conformanceExact } = judge(input)
  const body: ReadingBody = {
    ...input,
    kind: 'reading',
    checkId: 'coilPrimaryResistance',
    unit: unitId,
    asTyped: '2.2',
    subject: 'suspect',
    meterId: '01980000-0000-7000-8000-000000000301',
    meterName: 'Pocket meter',
    result: verdict && { verdict, estimate, standardU, expandedU, conformance, conformanceExact },
    ...changes,
  }
  return body
}

const text = (body: ReadingBody) =>
  renderToStaticMarkup(createElement(ReadingLine, { body })).replace(/<[^>]*>/g, '')

describe('a figure keeps the unit it was typed in', () => {
  it.each(OTHER_UNITS)('[F4] in the job log: 2.2 $unit.id', ({ quantity, unit }) => {
    const label = unitLabel(quantity, unit.id)
    const body = typed(quantity, unit.id)
    expect(text(body).replace(/\s/g, ' ')).toContain(`2.2 ${label}`)
    expect(entryMention(body, null)).toContain(`2.2 ${label}`)
    expect(stripOfBody(body)).toMatchObject({ shown: '2.2', unit: label })
  })

  it('[F4] two units of one quantity never read alike', () => {
    for (const quantity of Object.keys(QUANTITIES) as Quantity[]) {
      const labels = unitsOf(quantity).map(({ id }) => unitLabel(quantity, id))
      expect(new Set(labels).size).toBe(labels.length)
    }
  })

  it('[F4] over range the sentences name the top of the range once, in the typed unit', () => {
    const body = typed('resistance', 'kohm', { asTyped: '20', overRange: true })
    const strip = stripOfBody(body)
    if (strip === null) throw new Error('not judged')
    const sentence = meaning(strip, judge(body), 'ohm')
    expect(sentence).toBe('Over the range of the meter: more than 20 kohm.')
    expect(stripSentence(strip)).toMatch(/^Over range on the meter, above 20 kohm\./)
    expect(text(body).replace(/\s/g, ' ')).toContain('OL > 20 kohm'.replace('>', '&gt;'))
  })
})
