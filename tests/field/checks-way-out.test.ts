import { describe, expect, it } from 'vitest'
import { movesOf } from '@/components/outcome/way-out-form'
import { NOTICE_WORDS, refusalWords, SAID_WORDS } from '@/components/outcome/way-out-words'
import { SAID_BY_HAND } from '@/lib/diag/way-out'

describe('the way out, as it is said', () => {
  it('[R10] every refusal has its sentence, with the figures it was refused for', () => {
    const battery = { entryId: 'x', asTyped: '11.86', unit: 'V', emptyAtVolts: 11.9 }
    expect(refusalWords({ kind: 'emptyBattery', ...battery })).toBe(
      'Battery empty: 11.86 V at rest, 11.9 or less counts as empty.',
    )
    expect(refusalWords({ kind: 'said', what: 'noBrake' })).toBe('No working brake.')
    expect(refusalWords({ kind: 'hurt' })).toBe('Somebody is hurt.')
    expect(refusalWords({ kind: 'causeUnknown', strokes: 'two' })).toMatch(/two-stroke/)
    expect(refusalWords({ kind: 'causeUnknown', strokes: 'notKnown' })).toMatch(/four-stroke/)
    const fault = { fault: 'f', name: 'Piston', bookWords: 'It seizes.' }
    expect(refusalWords({ kind: 'faultForbids', ...fault })).toBe('Piston: It seizes.')
  })

  it('[R10] no two lines that are asked by hand read alike', () => {
    const words = SAID_BY_HAND.map((one) => SAID_WORDS[one])
    expect(new Set(words).size).toBe(SAID_BY_HAND.length)
  })

  it('[F6] a failed proof run is called no proof', () => {
    expect(NOTICE_WORDS.faultInProofRun).toMatch(/not proved/)
  })

  it('[R2] moves machine, people and job beside each other, only what changes', () => {
    const job = {
      id: 'j',
      machineState: 'stranded',
      peopleState: 'withMachine',
      state: 'open',
    } as const
    expect(movesOf(job, { machine: 'runs', people: 'withMachine' }).map((op) => op.kind)).toEqual([
      'job.machine',
      'job.move',
    ])
    const left = movesOf(job, { machine: 'leftBehind', people: 'onTheWay' })
    expect(left.at(-1)).toMatchObject({
      kind: 'job.move',
      fields: { from: 'open', to: 'waitingRetrieval' },
    })
    const waiting = { ...job, state: 'waitingParts', machineState: 'runs' } as const
    expect(movesOf(waiting, { machine: 'runs', people: 'withMachine' })).toEqual([])
  })
})
