import { describe, expect, it } from 'vitest'
import { givenName } from '@/components/desk/phone-name'
import { ROLES } from '@/lib/model/role'
import { rolesInWords } from '@/lib/shop/role-words'

describe('what a phone and a role are called', () => {
  it.each([
    ['Bench phone', 'Bench phone'],
    ['', null],
    ['Mozilla/5.0 (Linux; a phone) Something/1.0', null],
  ])('[R22] the phone %j is called %j', (told, name) => {
    expect(givenName(told)).toBe(name)
  })

  it('[R22] roles are said in words, in their order, and every one has words', () => {
    expect(rolesInWords(['mechanic', 'parts'])).toBe('mechanic, parts desk')
    expect(rolesInWords(ROLES).split(', ')).toHaveLength(ROLES.length)
    expect(rolesInWords([])).toBe('')
  })
})
