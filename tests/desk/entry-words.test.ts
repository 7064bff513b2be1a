import { describe, expect, it } from 'vitest'
import { entryMention, entryWords, kindWord } from '@/components/log/entry-words'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { indexBook } from '@/lib/diag/book-index'
import { codeBook } from '@/lib/model/code-book'
import type { LogBody } from '@/lib/model/log-entry'
import { METER } from '@/scripts/demo-shop'
import { AT } from '../support/shop-fixture'

const index = indexBook(
  codeBook.parse({ version: 1, hash: 'x', publishedAt: AT, items: BOOK_ITEMS }),
)
type Of<K extends LogBody['kind']> = Extract<LogBody, { kind: K }>
const say = (body: LogBody) => entryWords(body, index)

const reading = (changes: Partial<Of<'reading'>> = {}): LogBody => ({
  kind: 'reading',
  checkId: 'coilPrimaryResistance',
  quantity: 'resistance',
  value: 1,
  unit: 'ohm',
  asTyped: '1.0',
  overRange: false,
  subject: 'suspect',
  meterId: METER.id,
  meterName: METER.name,
  meterFunction: METER.functions.resistance!,
  leadsOhm: METER.leadsOhm,
  nulled: false,
  partTempC: 20,
  meterTempC: 20,
  perKelvin: METER.perKelvin,
  spec: null,
  result: null,
  ...changes,
})
const swap = (changes: Partial<Of<'swap'>> = {}): LogBody => ({
  kind: 'swap',
  swapId: 'coilSwap',
  step: 'spareFitted',
  faultPresent: false,
  partFrom: 'bag',
  partWords: null,
  ...changes,
})
const fix = (temporary: Of<'fix'>['temporary']): LogBody => ({
  kind: 'fix',
  fault: 'ignitionCoilPart',
  words: 'New coil fitted',
  temporary,
})
const run = (changes: Partial<Of<'proofRun'>> = {}): LogBody => ({
  kind: 'proofRun',
  starts: 12,
  minutes: 10,
  faults: 0,
  hot: true,
  words: null,
  boundExact: 1 - 0.05 ** (1 / 12),
  boundRuleOfThree: 0.25,
  ...changes,
})
const code = (seen: Of<'code'>['seen'], context: Partial<Of<'code'>['context']> = {}): LogBody => ({
  kind: 'code',
  seen,
  context: { module: 0, status: 'active', count: null, order: 1, photo: null, ...context },
})

describe('what an entry of the job log says, on the phone and at the desk', () => {
  it('[R11] a code: what the dash showed, what it names, and how it stood', () => {
    expect(say(code({ format: 'spn', spn: 1268, fmi: 3 }, { count: 4 }))).toEqual({
      shape: 'diamond',
      kind: 'Code',
      title: 'SPN 1268 FMI 3',
      lines: [
        expect.stringMatching(/^Ignition coil 1.*: .*above normal.*\.$/),
        'Module 0, active, counted 4.',
      ],
    })
  })

  it('[R11] a code the book does not know stays as shown', () => {
    const unknown = code({ format: 'asShown', text: 'E-77' }, { module: null, status: 'unknown' })
    expect(say(unknown)).toMatchObject({
      title: 'E-77',
      lines: ['Not in the code book: kept as shown.', 'Active or stored not shown.'],
    })
  })

  it('a symptom: the rider in quotes, and when it comes in one sentence', () => {
    const body: LogBody = {
      kind: 'symptom',
      symptom: 'startsThenDies',
      conditions: ['afterSeconds', 'whenHot'],
      words: 'Quits',
    }
    expect(say(body)).toEqual({
      shape: 'triangle',
      kind: 'Symptom',
      title: 'Starts, then dies',
      lines: ['“Quits”', 'After one to three seconds, when hot.'],
    })
    expect(say({ ...body, conditions: [], words: null }).lines).toEqual([])
  })

  it('[R8] a check: its outcome, what that counts as, and what was done differently', () => {
    const item = index.checks.get('coilConnectorLook')!
    const good = item.outcomes.find((one) => one.good)!
    const bad = item.outcomes.find((one) => !one.good)!
    const of = (outcome: string, more: Partial<Of<'check'>> = {}) =>
      say({
        kind: 'check',
        checkId: item.id,
        outcome,
        asWritten: true,
        differed: null,
        ...more,
      })
    expect(of(good.id)).toMatchObject({
      title: `${item.name}: ${good.name}`,
      lines: ['Counts as good.'],
    })
    expect(of(bad.id, { asWritten: false, differed: 'No lamp' }).lines).toEqual([
      'Counts as bad.',
      'Done differently: No lamp',
    ])
    expect(of('odd', { asWritten: false, differed: '' })).toMatchObject({
      title: `${item.name}: odd`,
      lines: ['Done differently: not said how'],
    })
  })

  it('a reading: on which part, with which meter; leads only where they count', () => {
    expect(say(reading()).lines).toEqual([`${METER.name}, leads not nulled.`])
    expect(say(reading({ subject: 'knownGood', nulled: true })).lines).toEqual([
      'On a known-good part.',
      `${METER.name}, leads nulled.`,
    ])
    expect(say(reading({ quantity: 'dcVoltage', unit: 'V' })).lines).toEqual([`${METER.name}.`])
  })

  it('[F5] a step of a swap: what became of the fault, and where the good part came from', () => {
    expect(say(swap())).toMatchObject({
      shape: 'hexagon',
      title: 'Spare fitted: fault gone',
      lines: ['Ignition coil, from the bag.'],
    })
    expect(say(swap({ step: 'oldRefitted', faultPresent: true }))).toMatchObject({
      title: 'Old part refitted: fault there',
      lines: ['Ignition coil.'],
    })
    const twin = swap({ step: 'newFitted', faultPresent: null, partFrom: 'twin', partWords: 'new' })
    expect(say(twin)).toMatchObject({
      title: 'New part fitted: not tried',
      lines: ['Ignition coil, from a machine of the same model, new.'],
    })
  })

  it('[F6] a fix is named by its fault; with a limit it is a temporary measure', () => {
    expect(say(fix(null))).toEqual({
      shape: 'flag',
      kind: 'Fix',
      title: 'New coil fitted',
      lines: ['Ignition coil.'],
    })
    expect(say(fix({ limit: 'Home, 20 km/h', undo: 'Cut the tape!' }))).toMatchObject({
      kind: 'Temporary measure',
      lines: [
        'Ignition coil.',
        'Temporary measure. Limit: Home, 20 km/h.',
        'To undo: Cut the tape!',
      ],
    })
  })

  it('[F7] a proof run with its bound: 12 clean starts leave up to 22 of 100', () => {
    // Exact one-sided 95 % bound 1 - 0.05^(1/12) = 0.2209 (Clopper-Pearson).
    expect(say(run())).toMatchObject({
      shape: 'flag',
      kind: 'Proof run',
      title: '12 starts, 10 min without the fault',
      lines: ['Hot.', 'Up to 22 of 100 starts could still show it (one-sided 95 %).'],
    })
    expect(say(run({ starts: 1, faults: 1, hot: false, boundExact: null, words: 'Died' }))).toEqual(
      expect.objectContaining({
        title: '1 start, 10 min, the fault came once',
        lines: ['Not hot.', 'Died'],
      }),
    )
    expect(say(run({ faults: 3 })).title).toBe('12 starts, 10 min, the fault came 3 times')
  })

  it('[R2] a way out keeps people and machine beside each other', () => {
    const body: LogBody = {
      kind: 'wayOut',
      wayOut: 'limpOut',
      reasons: 'Light enough',
      machineState: 'limping',
      peopleState: 'onTheWay',
    }
    expect(say(body)).toEqual({
      shape: 'flag',
      kind: 'Way out',
      title: 'Limp out',
      lines: ['Light enough', 'People: on the way. Machine: limping.'],
    })
  })

  it('the rest in plain sentences', () => {
    const photo = {
      hash: 'a'.repeat(64),
      bytes: 1,
      mime: 'image/png',
      width: 1,
      height: 1,
    } as const
    const told = (body: LogBody) => {
      const { kind, title, lines } = say(body)
      return [kind, title, ...lines]
    }
    expect(told({ kind: 'codesUnreadable', reason: 'Dash dead' })).toEqual([
      'Codes',
      'Codes could not be read',
      'Dash dead',
    ])
    expect(told({ kind: 'codesCleared', readAgain: 'noneBack' })).toEqual([
      'Codes',
      'Codes cleared',
      'Read again: none came back.',
    ])
    expect(told({ kind: 'couldNot', checkId: 'coilConnectorLook', reason: 'Dark' })).toEqual([
      'Check',
      `${index.checks.get('coilConnectorLook')!.name}: could not`,
      'Dark',
    ])
    expect(told({ kind: 'photo', photo, caption: null })).toEqual(['Photo', 'Photo'])
    expect(told({ kind: 'photo', photo, caption: 'The seat' })).toEqual(['Photo', 'The seat'])
    expect(told({ kind: 'note', words: 'Smells' })).toEqual(['Note', 'Smells'])
    expect(told({ kind: 'people', to: 'safe', words: null })).toEqual(['People', 'People: safe'])
    expect(told({ kind: 'correction', reason: 'Wrong job' })).toEqual([
      'Correction',
      'Correction',
      'Wrong job',
    ])
  })

  it('names ids by themselves where the code book is not there yet', () => {
    expect(entryWords(reading(), null).title).toBe('coilPrimaryResistance')
    expect(entryWords(swap(), null).lines).toEqual(['coilSwap, from the bag.'])
    expect(entryWords(code({ format: 'pcode', code: 'P0351' }), null)).toMatchObject({
      title: 'P0351',
      lines: ['Module 0, active.'],
    })
  })
})

describe('an entry inside another sentence', () => {
  it.each([
    [reading(), 'Coil primary resistance: 1.0 ohm, NO LIMIT TO JUDGE BY'],
    [reading({ subject: 'knownGood', asTyped: '-1' }), /on a known-good part: −1 ohm/],
    [swap({ step: 'oldRefitted', faultPresent: true }), /: old part refitted, fault there$/],
    [code({ format: 'flash', pattern: '2-4' }), 'Flash code 2-4'],
    [code({ format: 'asShown', text: 'E-77' }), 'code E-77'],
    [fix(null), 'fix: New coil fitted'],
    [fix({ limit: 'Home', undo: 'Cut' }), 'temporary measure: New coil fitted'],
    [run(), 'proof run: 12 starts, 10 min without the fault'],
    [{ kind: 'codesUnreadable', reason: 'Dead' }, 'Codes could not be read'],
  ] as [LogBody, string | RegExp][])('%# is mentioned in a few words', (body, words) => {
    expect(entryMention(body, index)).toMatch(words)
    expect(kindWord(body)).toBe(entryWords(body, index).kind)
  })
})
