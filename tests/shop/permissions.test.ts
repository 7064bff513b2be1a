import { describe, expect, it } from 'vitest'
import type { Role } from '@/lib/model/role'
import { ROLES } from '@/lib/model/role'
import { ACTIONS, type Action, may, mayLog } from '@/lib/shop/permissions'

/** The table of product.md "People and roles", written out by hand: who may. */
const TABLE: Partial<Record<Action, Role[]>> = {
  'job.open': ['mechanic', 'guide', 'dispatcher', 'owner'],
  'job.assign': ['dispatcher', 'owner'],
  'job.merge': ['dispatcher', 'owner'],
  'job.close': ['mechanic', 'dispatcher', 'owner'],
  'check.do': ['mechanic', 'owner'],
  'part.ask': ['mechanic', 'parts', 'owner'],
  'part.work': ['parts', 'owner'],
  'machine.release': ['mechanic'],
  'book.publish': ['owner'],
  'member.manage': ['owner'],
  'desk.see': ['mechanic', 'dispatcher', 'parts', 'owner'],
  'field.write': ['mechanic', 'guide', 'owner'],
  'machine.add': ['mechanic', 'dispatcher', 'owner'],
  'field.see': ['mechanic', 'guide', 'dispatcher', 'owner'],
}

describe('permissions', () => {
  for (const [action, roles] of Object.entries(TABLE)) {
    it(`[R22] ${action} is for ${roles.join(', ')} and nobody else`, () => {
      expect(ROLES.filter((role) => may([role], action as Action))).toEqual(roles)
    })
  }

  it('[R22] nobody without a role may do anything', () => {
    expect(ACTIONS.filter((action) => may([], action))).toEqual([])
  })

  it('[R22] two roles together may do what either may', () => {
    for (const action of ACTIONS) {
      expect(may(['guide', 'parts'], action)).toBe(may(['guide'], action) || may(['parts'], action))
    }
  })

  it('[R3] the owner may do all of it save the release', () => {
    expect(ACTIONS.filter((action) => !may(['owner'], action))).toEqual(['machine.release'])
  })

  it('[R16] a guide records only what is marked safe for guides', () => {
    expect(mayLog(['guide'], 'check', true)).toBe(true)
    expect(mayLog(['guide'], 'check', false)).toBe(false)
    expect(mayLog(['guide'], 'swap', false)).toBe(false)
    expect(mayLog(['guide'], 'symptom', false)).toBe(true)
    expect(mayLog(['guide'], 'fix', true)).toBe(false)
    expect(mayLog(['guide', 'mechanic'], 'fix', false)).toBe(true)
  })

  it('[R22] the desk writes words and pictures, not evidence', () => {
    expect(mayLog(['dispatcher'], 'note', false)).toBe(true)
    expect(mayLog(['dispatcher'], 'reading', true)).toBe(false)
    expect(mayLog(['parts'], 'check', true)).toBe(false)
  })
})
