/**
 * How a photo or a voice note comes in (PH2): tus 1.0.0 with creation, expiration and checksum. Its name
 * is its SHA-256, so a restart or a new sign-in goes on where it stood. POST UPLOAD_PATH creates and
 * answers where it stands, HEAD asks, PATCH adds a chunk; each is signed by the phone's key.
 */
export const UPLOAD_PATH = '/api/photos/tus'
export const TUS_VERSION = '1.0.0'
/** Most bytes of one chunk; each is held whole until its check sum is known. */
export const MAX_CHUNK_BYTES = 1_048_576

export const UPLOAD_HEADERS = {
  version: 'tus-resumable',
  offset: 'upload-offset',
  length: 'upload-length',
  /** `sha256 <base64 of the hash in hex>` at creation. */
  metadata: 'upload-metadata',
  /** `sha256 <base64>` of the chunk. */
  checksum: 'upload-checksum',
  /** The hash, once the shop has the whole file verified and stored. */
  stored: 'x-farbench-stored',
  /** The kind of a refusal: an answer to HEAD has no body to say it in. */
  problem: 'x-farbench-problem',
} as const

/** tus: the chunk's bytes do not match its check sum. */
export const CHECKSUM_MISMATCH = 460

/** What an upload's request does: create (`at` is the size), ask (`at` is 0), add a chunk (`at` is its offset). */
export type UploadAct = 'create' | 'ask' | 'chunk'

/**
 * The text a phone signs for one request of an upload (ECDSA P-256, SHA-256, raw r||s, base64url): shop,
 * person and device, what it does to which file where, and the base64 SHA-256 of the chunk (`-` for none).
 * Its first line keeps it apart from the text of a push.
 */
export function uploadText(of: {
  shop: string
  person: string
  device: string
  act: UploadAct
  hash: string
  at: number
  chunk: string
}): string {
  const { shop, person, device, act, hash, at, chunk } = of
  return ['farbench-upload-1', shop, person, device, act, hash, String(at), chunk].join('\n')
}
