import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { setPassword } from '@/db/queries/people'
import { checkSignIn } from '@/lib/auth/check-sign-in'
import { clientAddress } from '@/lib/auth/client-address'
import { BusyError, slots } from '@/lib/auth/hash-slots'
import { hashPassword } from '@/lib/auth/password'
import { forgetTries, giveBackTry, takeTry } from '@/lib/auth/tries'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { makeShop, type TestPerson } from '../support/shop-fixture'

const NOW = Date.UTC(2026, 10, 24, 18, 40)
const RIGHT = 'a good long one'

let test: TestDatabase
let person: TestPerson
beforeAll(async () => {
  test = await openTestDatabase()
  const shop = await makeShop({ dispatcher: ['dispatcher'] })
  person = shop.people.dispatcher!
  const passwordHash = await hashPassword(RIGHT)
  await asShop(shop.id, (tx) => setPassword(tx, { personId: person.id, passwordHash }))
})
afterAll(() => test.close())

const attempt = (password: string, address: string, now = NOW) =>
  checkSignIn({ email: person.email, password }, { address, now }).then(
    (found) => (found ? 'in' : 'wrong'),
    (problem: Error) => problem.message,
  )

describe('[D4] sign-in is slowed, not locked by a stranger', () => {
  it('[D4] 20 wrong tries at once pass no more than 5 of them', async () => {
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, i) => attempt(`wrong ${i}`, '192.0.2.1')),
    )
    expect(answers.filter((answer) => answer === 'wrong')).toHaveLength(5)
    expect(answers.filter((answer) => answer === 'locked')).toHaveLength(15)
  })

  it('[D4] the same person signs in from another address meanwhile', async () => {
    expect(await attempt(RIGHT, '192.0.2.1')).toBe('locked')
    expect(await attempt(RIGHT, '198.51.100.7')).toBe('in')
  })

  it('[D4] the window over, the first address may try again', async () => {
    expect(await attempt(RIGHT, '192.0.2.1', NOW + 15 * 60_000 + 1)).toBe('in')
  })

  it('[D4] right passwords use no tries up', async () => {
    for (let i = 0; i < 6; i++) expect(await attempt(RIGHT, '203.0.113.9')).toBe('in')
  })
})

describe('[D4] the three brakes', () => {
  const spend = (count: number, trier: (i: number) => { email: string; address: string }) =>
    Array.from({ length: count }, (_, i) => takeTry(trier(i), NOW)).filter(Boolean).length

  it('[D4] 30 from one address, whatever the e-mail', () => {
    const address = '192.0.2.30'
    expect(spend(40, (i) => ({ email: `person${i}@test.invalid`, address }))).toBe(30)
  })

  it('[D4] 100 for one e-mail, from wherever', () => {
    const email = 'one@test.invalid'
    expect(spend(120, (i) => ({ email, address: `198.51.100.${i}` }))).toBe(100)
  })

  it('[D4] no crowd of new e-mails flushes the count of one, given back or not', () => {
    const later = NOW + 3_600_000
    const email = 'victim@test.invalid'
    const guess = (i: number) => takeTry({ email, address: `198.51.100.${i}` }, later)
    expect(Array.from({ length: 60 }, (_, i) => guess(i)).filter(Boolean)).toHaveLength(60)
    for (let i = 0; i < 12_000; i++) {
      const crowd = { email: `crowd${i}@test.invalid`, address: `10.${i >> 8}.${i & 255}.1` }
      expect(takeTry(crowd, later)).toBe(true)
      if (i % 2 === 0) giveBackTry(crowd)
    }
    const more = Array.from({ length: 90 }, (_, i) => guess(100 + i)).filter(Boolean)
    expect(more).toHaveLength(40)
  })

  it('[D4] a try that decided nothing is given back; a good one forgets the wrong ones', () => {
    const trier = { email: 'two@test.invalid', address: '203.0.113.30' }
    expect(spend(5, () => trier)).toBe(5)
    expect(takeTry(trier, NOW)).toBe(false)
    giveBackTry(trier)
    expect(takeTry(trier, NOW)).toBe(true)
    forgetTries(trier)
    expect(spend(9, () => trier)).toBe(5)
  })
})

describe('[D4] the slots of password checks', () => {
  it('[D4] two run, the rest wait in turn, and one too many is told so', async () => {
    const inTurn = slots(2, 3)
    const began: number[] = []
    const ends: (() => void)[] = []
    const job = (i: number) =>
      inTurn(() => {
        began.push(i)
        return new Promise<void>((end) => ends.push(end))
      })
    const all = [0, 1, 2, 3, 4].map(job)
    await expect(job(5)).rejects.toBeInstanceOf(BusyError)
    expect(began).toEqual([0, 1])
    for (let i = 0; i < 5; i++) {
      ends[i]!()
      await all[i]
    }
    expect(began).toEqual([0, 1, 2, 3, 4])
    const last = job(6)
    ends[5]!()
    await last
  })

  it('[D4] work that fails gives its slot back', async () => {
    const inTurn = slots(1, 0)
    await expect(inTurn(() => Promise.reject(new Error('no')))).rejects.toThrow('no')
    expect(await inTurn(() => Promise.resolve(7))).toBe(7)
  })
})

describe('[D4] the address of a client', () => {
  it.each([
    ['203.0.113.4', '203.0.113.4'],
    ['10.9.9.9, 203.0.113.4', '203.0.113.4'],
    ['::ffff:127.0.0.1', '127.0.0.1'],
    ['2001:db8:0:42:1::9', '2001:db8:0:42::/64'],
    ['2001:0db8::1', '2001:db8:0:0::/64'],
    ['::1', '0:0:0:0::/64'],
    ['fe80::1%eth0', 'fe80:0:0:0::/64'],
    ['anything', 'unknown'],
    ['', 'unknown'],
    [undefined, 'unknown'],
  ])('[D4] %s is the key %s', (forwarded, key) => {
    expect(clientAddress(forwarded)).toBe(key)
  })
})
