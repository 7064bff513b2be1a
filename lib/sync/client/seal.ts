/**
 * Sealing (rule R22): AES-GCM (NIST SP 800-38D) with a fresh random 96-bit nonce in front of the sealed
 * bytes. The name of the place a thing is kept in is authenticated with it, so that a row moved to
 * another row's place does not open. Crypto is never awaited inside an IndexedDB transaction, which
 * would commit: seal first, then write.
 */
export type Sealed = Uint8Array<ArrayBuffer>

const NONCE_BYTES = 12

const text = new TextEncoder()
const words = new TextDecoder()

/** Seals bytes for the place named `place`. */
export async function sealBytes(
  key: CryptoKey,
  place: string,
  plain: BufferSource,
): Promise<Sealed> {
  const nonce = crypto.getRandomValues(new Uint8Array(NONCE_BYTES))
  const sealed = await crypto.subtle.encrypt(
    { name: 'AES-GCM', iv: nonce, additionalData: text.encode(place) },
    key,
    plain,
  )
  const whole = new Uint8Array(NONCE_BYTES + sealed.byteLength)
  whole.set(nonce)
  whole.set(new Uint8Array(sealed), NONCE_BYTES)
  return whole
}

/** The bytes sealed for `place`; throws OperationError when key, place or bytes are not the right ones. */
export function openBytes(key: CryptoKey, place: string, sealed: Sealed): Promise<ArrayBuffer> {
  return crypto.subtle.decrypt(
    {
      name: 'AES-GCM',
      iv: sealed.subarray(0, NONCE_BYTES),
      additionalData: text.encode(place),
    },
    key,
    sealed.subarray(NONCE_BYTES),
  )
}

/** Seals a plain JSON value. */
export const sealJson = (key: CryptoKey, place: string, value: unknown): Promise<Sealed> =>
  sealBytes(key, place, text.encode(JSON.stringify(value)))

/** The JSON value sealed for `place`. */
export async function openJson(key: CryptoKey, place: string, sealed: Sealed): Promise<unknown> {
  return JSON.parse(words.decode(await openBytes(key, place, sealed)))
}
