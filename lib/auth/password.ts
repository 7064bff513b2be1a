import { randomBytes, type ScryptOptions, scrypt, timingSafeEqual } from 'node:crypto'
import { hashInTurn } from './hash-slots'

/**
 * Password hashes by scrypt (RFC 7914), N = 2^17, r = 8, p = 1: the figure of the OWASP Password
 * Storage Cheat Sheet, from memory. Text form `scrypt$N$r$p$salt$hash`, base64url, so that the
 * cost can rise later without touching old rows.
 */
const COST = { N: 2 ** 17, r: 8, p: 1 }
const LENGTH = 32
const MAX_MEMORY = 256 * 1024 * 1024

/** Waits for one of the slots; throws BusyError when too many wait. */
const derive = (password: string, salt: Buffer, cost: ScryptOptions) =>
  hashInTurn(
    () =>
      new Promise<Buffer>((resolve, reject) =>
        scrypt(
          password.normalize('NFKC'),
          salt,
          LENGTH,
          { ...cost, maxmem: MAX_MEMORY },
          (error, key) => (error ? reject(error) : resolve(key)),
        ),
      ),
  )

/** Answers the text form of a new hash with its own random salt. */
export async function hashPassword(password: string): Promise<string> {
  const salt = randomBytes(16)
  const key = await derive(password, salt, COST)
  return [
    'scrypt',
    COST.N,
    COST.r,
    COST.p,
    salt.toString('base64url'),
    key.toString('base64url'),
  ].join('$')
}

/** Answers whether the password belongs to the hash; false for a hash it cannot read. */
export async function verifyPassword(password: string, stored: string): Promise<boolean> {
  const [scheme, n, r, p, salt, hash] = stored.split('$')
  if (scheme !== 'scrypt' || !n || !r || !p || !salt || !hash) return false
  const wanted = Buffer.from(hash, 'base64url')
  const key = await derive(password, Buffer.from(salt, 'base64url'), {
    N: Number(n),
    r: Number(r),
    p: Number(p),
  })
  return key.length === wanted.length && timingSafeEqual(key, wanted)
}

let decoy: Promise<string> | null = null

/** Spends the time of one check, so that an unknown e-mail address answers as slowly as a known one. */
export async function spendCheck(password: string): Promise<false> {
  decoy ??= hashPassword(randomBytes(16).toString('hex')).catch((problem: unknown) => {
    decoy = null
    throw problem
  })
  await verifyPassword(password, await decoy)
  return false
}
