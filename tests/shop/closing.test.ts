import { describe, expect, it } from 'vitest'
import { closingBoxes, closingOf, OWN_WORDS } from '@/components/desk/job/closing.schema'
import type { Closing } from '@/lib/model/closing'
import type { JobState } from '@/lib/model/job'
import type { Role } from '@/lib/model/role'
import { closingMove, reopeningMove } from '@/lib/shop/closing'

const asked = (roles: Role[], state: JobState, more: { assignedTo?: string[] } = {}) => ({
  actor: { personId: 'p1', roles },
  job: { state, openedBy: 'p9', assignedTo: more.assignedTo ?? ['p2'] },
  from: state,
})
const proved: Closing = {
  cause: { kind: 'fault', fault: 'coilPrimaryOpen' },
  grade: 'proved',
  reason: 'New coil fitted.',
}
const refused = (kind: string) => ({ ok: false, problem: { kind } })

describe('[R25] closing asks for the cause and its grade', () => {
  it.each([
    [proved, 'Coil open', 'Job closed. Cause proved: Coil open. New coil fitted.'],
    [
      { ...proved, cause: { kind: 'words', words: 'Chafed wire' }, grade: 'likely' },
      null,
      'Job closed. Cause likely: Chafed wire. New coil fitted.',
    ],
    [
      { cause: null, grade: 'unknown', reason: 'Towed.' },
      null,
      'Job closed. Cause unknown. Towed.',
    ],
    [
      { cause: null, grade: 'noFaultFound', reason: 'Ran an hour.' },
      null,
      'Job closed. No fault found. Ran an hour.',
    ],
  ] as [Closing, string | null, string][])('[R25] %j', (closing, name, words) => {
    const move = closingMove(asked(['dispatcher'], 'underWay'), closing, name)
    const fault = closing.cause?.kind === 'fault' ? closing.cause.fault : null
    const detail = { fault, grade: closing.grade }
    expect(move).toEqual({ ok: true, value: { to: 'closed', words, detail } })
  })

  it('[R25] a named cause goes with proved and likely, and with no other grade', () => {
    const dispatcher = asked(['dispatcher'], 'open')
    expect(closingMove(dispatcher, { ...proved, cause: null }, null)).toEqual(
      refused('causeMissing'),
    )
    expect(closingMove(dispatcher, { ...proved, grade: 'unknown' }, 'Coil open')).toEqual(
      refused('causeTooMuch'),
    )
  })
})

describe('[R13] who may close and reopen, and from where', () => {
  it.each([
    [['dispatcher'], {}, true],
    [['owner'], {}, true],
    [['mechanic'], { assignedTo: ['p1'] }, true],
    [['mechanic'], {}, false],
    [['parts'], {}, false],
    [['guide'], { assignedTo: ['p1'] }, false],
    [[], {}, false],
  ] as [Role[], { assignedTo?: string[] }, boolean][])(
    '[R13] %j with hands %j: %s',
    (roles, hands, may) => {
      expect(closingMove(asked(roles, 'open', hands), proved, 'Coil open').ok).toBe(may)
      expect(reopeningMove(asked(roles, 'closed', hands), 'Came back.').ok).toBe(may)
    },
  )

  it('[R13] a screen that is behind is told where the job is now', () => {
    const behind = { ...asked(['owner'], 'closed'), from: 'open' as const }
    const moved = { ok: false, problem: { kind: 'jobMovedMeanwhile', now: 'closed' } }
    expect(closingMove(behind, proved, 'Coil open')).toEqual(moved)
    expect(closingMove(asked(['owner'], 'closed'), proved, 'Coil open')).toEqual(moved)
    expect(reopeningMove(asked(['owner'], 'underWay'), 'Again.')).toMatchObject({ ok: false })
  })
})

describe('[R25] the boxes of the form', () => {
  const boxes = { grade: 'likely' as const, cause: 'coil', causeWords: '', reason: ' Done. ' }
  const faults = (typed: unknown) =>
    closingBoxes.safeParse(typed).error?.issues.map(({ path }) => path.join()) ?? []

  it('[R25] ask for grade, reason, and a cause where the grade names one', () => {
    expect(faults(boxes)).toEqual([])
    expect(faults({ ...boxes, grade: null })).toContain('grade')
    expect(faults({ ...boxes, reason: '  ' })).toContain('reason')
    expect(faults({ ...boxes, cause: '' })).toContain('cause')
    expect(faults({ ...boxes, cause: OWN_WORDS })).toContain('causeWords')
    expect(faults({ ...boxes, grade: 'unknown', cause: '' })).toEqual([])
  })

  it('[R25] become a closing: a fault, own words, or none', () => {
    const whole = closingBoxes.parse(boxes)
    expect(closingOf(whole)).toEqual({
      grade: 'likely',
      cause: { kind: 'fault', fault: 'coil' },
      reason: 'Done.',
    })
    expect(closingOf({ ...whole, cause: OWN_WORDS, causeWords: 'Wire' }).cause).toEqual({
      kind: 'words',
      words: 'Wire',
    })
    expect(closingOf({ ...whole, grade: 'noFaultFound' }).cause).toBeNull()
  })
})
