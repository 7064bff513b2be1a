import { describe, expect, test } from 'vitest'
import { type CodeDraft, contextOf, EMPTY_CODE, seenOf } from '@/components/field/codes/code-draft'
import { codeContext, codeSeen } from '@/lib/model/code-seen'

const draft = (over: Partial<CodeDraft>): CodeDraft => ({ ...EMPTY_CODE, ...over })

describe('[R11] codes as seen', () => {
  test('takes the three numbers of the dash down as they stand', () => {
    const typed = draft({ module: '0', spn: '1268', fmi: '3', status: 'active' })
    expect(seenOf(typed)).toEqual({ ok: true, value: { format: 'spn', spn: 1268, fmi: 3 } })
    expect(contextOf(typed, 1)).toEqual({
      ok: true,
      value: { module: 0, status: 'active', count: null, order: 1, photo: null },
    })
  })

  // SPN has 19 bits, FMI 5, the occurrence count 7 with 127 for "not available" (SAE J1939-73).
  test.each([
    [{ spn: '524287', fmi: '31' }, null],
    [{ spn: '524288', fmi: '31' }, 'spn'],
    [{ spn: '1268', fmi: '32' }, 'fmi'],
    [{ spn: '', fmi: '3' }, 'spn'],
    [{ spn: '12.5', fmi: '3' }, 'spn'],
    [{ spn: '-1', fmi: '3' }, 'spn'],
    [{ spn: '1268', fmi: '' }, 'fmi'],
    [{ format: 'pcode', pcode: ' p0351 ' }, null],
    [{ format: 'pcode', pcode: 'P4351' }, 'pcode'],
    [{ format: 'pcode', pcode: 'X0351' }, 'pcode'],
    [{ format: 'pcode', pcode: 'P03511' }, 'pcode'],
    [{ format: 'asShown', text: '  ' }, 'text'],
    [{ format: 'asShown', text: 'E-14 wrench' }, null],
  ] as const)('%j', (typed, wrong) => {
    const seen = seenOf(draft(typed))
    expect(seen.ok ? null : seen.problem.field).toBe(wrong)
    if (seen.ok) {
      expect(codeSeen.safeParse(seen.value).success).toBe(true)
    }
  })

  test('flashes count only when two repeats match', () => {
    const once = { format: 'flash', flash: '2-4' } as const
    expect(seenOf(draft(once))).toMatchObject({ ok: false, problem: { field: 'flashAgain' } })
    expect(seenOf(draft({ ...once, flashAgain: '2-5' })).ok).toBe(false)
    expect(seenOf(draft({ ...once, flashAgain: '2 4' }))).toEqual({
      ok: true,
      value: { format: 'flash', pattern: '2-4' },
    })
    expect(seenOf(draft({ format: 'flash', flash: 'two', flashAgain: 'two' })).ok).toBe(false)
  })

  test.each([
    [{ status: null }, 'status'],
    [{ status: 'stored', module: '256' }, 'module'],
    [{ status: 'stored', count: '127' }, 'count'],
    [{ status: 'stored', module: '255', count: '126' }, null],
    [{ status: 'unknown' }, null],
  ] as const)('context %j', (typed, wrong) => {
    const context = contextOf(draft(typed), 2)
    expect(context.ok ? null : context.problem.field).toBe(wrong)
    if (context.ok) {
      expect(codeContext.safeParse(context.value).success).toBe(true)
    }
  })
})
