import { describe, expect, it } from 'vitest'
import { phoneTitles } from '@/components/desk/phones/phone-words'
import type { DeskPhone } from '@/lib/model/phones'

const phoneOf = (
  id: string,
  personId: string,
  name: string | null,
  enrolledAt: string,
): DeskPhone => ({
  id,
  words: '',
  person: { id: personId, name, isMember: true },
  enrolledAt,
  lastSeenAt: null,
  clockOffsetMs: null,
  held: null,
  revoked: null,
  wipeToldAt: null,
  gone: null,
  bookVersion: null,
  missing: 0,
  items: [],
})

describe('[R22] what a phone is called at the desk', () => {
  it('is its person, numbered by when it came into use where there are several', () => {
    const titles = phoneTitles([
      phoneOf('b', 'p1', 'Jory Fenn', '2026-11-24T08:00:00.000Z'),
      phoneOf('c', 'p2', 'Tove Marl', '2026-11-24T07:00:00.000Z'),
      phoneOf('a', 'p1', 'Jory Fenn', '2026-11-20T08:00:00.000Z'),
      phoneOf('d', 'p3', null, '2026-11-20T08:00:00.000Z'),
    ])
    expect(Object.fromEntries(titles)).toEqual({
      a: 'Jory Fenn, phone 1',
      b: 'Jory Fenn, phone 2',
      c: 'Tove Marl',
      d: 'Name erased',
    })
  })
})
