import { AppError } from '@/lib/model/result'
import { findKey, type KeyRecord, type PhoneDb, type StoreWrap } from './phone-db'

/**
 * The keys of one person's store (rules R22, P18), each of them not exportable by a script:
 * - `device`: ECDSA P-256 pair, signs what is sent;
 * - `outbox`: AES-GCM 256, seals ops, so that the worker can send them without a PIN;
 * - `store`: AES-GCM 256, random, seals rows, photos and drafts. It lies wrapped (AES-KW, RFC 3394)
 *   under a key of this phone. A PIN later adds its own wrap of the same key; no row is sealed anew.
 */
export type SendKeys = { device: CryptoKeyPair; outbox: CryptoKey }
export type PhoneKeys = SendKeys & { store: CryptoKey }

const AES = { name: 'AES-GCM', length: 256 } as const

/** The keys of this store, made on first use. Two tabs at once get the same ones. */
export async function openKeys(db: PhoneDb): Promise<PhoneKeys> {
  const send = (await findSendKeys(db)) ?? (await makeSendKeys(db))
  if ((await findKey(db, 'store')) === undefined) await keepFirst(db, await newStoreRecord())
  const held = await findKey(db, 'store')
  if (held === undefined) throw new AppError('keysMixedUp')
  return { ...send, store: await unwrapStore(held.wraps) }
}

/** The keys that sending needs; null when this store was never opened by a page. */
export async function findSendKeys(db: PhoneDb): Promise<SendKeys | null> {
  const device = await findKey(db, 'device')
  const outbox = await findKey(db, 'outbox')
  if (device === undefined || outbox === undefined) return null
  return { device: device.pair, outbox: outbox.key }
}

async function makeSendKeys(db: PhoneDb): Promise<SendKeys> {
  const pair = await crypto.subtle.generateKey({ name: 'ECDSA', namedCurve: 'P-256' }, false, [
    'sign',
    'verify',
  ])
  const outbox = await crypto.subtle.generateKey(AES, false, ['encrypt', 'decrypt'])
  await keepFirst(db, { name: 'device', pair })
  await keepFirst(db, { name: 'outbox', key: outbox })
  const held = await findSendKeys(db)
  if (held === null) throw new AppError('keysMixedUp')
  return held
}

/** Keeps the record unless one of that name is there already. */
function keepFirst(db: PhoneDb, record: KeyRecord): Promise<void> {
  return db.transaction('rw', db.key, async () => {
    if ((await findKey(db, record.name)) === undefined) await db.key.add(record)
  })
}

async function newStoreRecord(): Promise<KeyRecord> {
  const wrapping = await crypto.subtle.generateKey({ name: 'AES-KW', length: 256 }, false, [
    'wrapKey',
    'unwrapKey',
  ])
  // Extractable for this one moment, or it could not be wrapped; unwrapped it no longer is.
  const store = await crypto.subtle.generateKey(AES, true, ['encrypt', 'decrypt'])
  const wrapped = await crypto.subtle.wrapKey('raw', store, wrapping, 'AES-KW')
  return { name: 'store', wraps: [{ by: 'device', with: wrapping, wrapped }] }
}

/** The store key; null when this store holds none that opens without its person. */
export async function findStoreKey(db: PhoneDb): Promise<CryptoKey | null> {
  const held = await findKey(db, 'store')
  const opens = held?.wraps.some((wrap) => wrap.by === 'device') === true
  return held !== undefined && opens ? await unwrapStore(held.wraps) : null
}

function unwrapStore(wraps: StoreWrap[]): Promise<CryptoKey> {
  const wrap = wraps.find((one) => one.by === 'device')
  if (wrap === undefined) throw new AppError('storeIsLocked')
  return crypto.subtle.unwrapKey('raw', wrap.wrapped, wrap.with, 'AES-KW', AES, false, [
    'encrypt',
    'decrypt',
  ])
}

/** The public half of the device key, for the shop. */
export async function publicKeyOf(keys: SendKeys) {
  const jwk = await crypto.subtle.exportKey('jwk', keys.device.publicKey)
  if (jwk.x === undefined || jwk.y === undefined) throw new AppError('keysMixedUp')
  return { kty: 'EC' as const, crv: 'P-256' as const, x: jwk.x, y: jwk.y }
}
