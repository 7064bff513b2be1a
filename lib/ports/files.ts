import {
  GetObjectCommand,
  HeadObjectCommand,
  PutObjectCommand,
  S3Client,
  S3ServiceException,
} from '@aws-sdk/client-s3'
import { env } from '@/lib/env'
import { AppError } from '@/lib/model/result'

/** Whole files by key. Keys are `folder/name` of letters, digits, dot and hyphen. */
export type Files = {
  /** Keeps the bytes; an existing file of that key is replaced at once or not at all. */
  put(key: string, bytes: Uint8Array, mime: string): Promise<void>
  /** The bytes, or null when there are none under that key. */
  get(key: string): Promise<Uint8Array<ArrayBuffer> | null>
  has(key: string): Promise<boolean>
}

/** How to reach a store that speaks S3, path style. */
export type FilesAddress = {
  url: string
  bucket: string
  region: string
  key: string
  secret: string
}

const KEY = /^[A-Za-z0-9-]{1,64}\/[A-Za-z0-9][A-Za-z0-9.-]{0,127}$/
/** A store that does not answer for so long is away (choices). */
const CONNECT_MS = 2_000
const ANSWER_MS = 20_000

const isMissing = (error: unknown): boolean =>
  error instanceof S3ServiceException && error.$metadata.httpStatusCode === 404

/**
 * Files in an S3-compatible store. Trouble is an AppError `filesAway` to be tried again: the SDK has
 * tried three times by then. Check sums are sent where S3 asks for them alone; streams are never sent.
 */
export function s3Files(address: FilesAddress): Files {
  const client = new S3Client({
    endpoint: address.url,
    region: address.region,
    forcePathStyle: true,
    credentials: { accessKeyId: address.key, secretAccessKey: address.secret },
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    requestHandler: { connectionTimeout: CONNECT_MS, requestTimeout: ANSWER_MS },
  })
  const at = (key: string) => {
    if (!KEY.test(key)) throw new AppError('badFileKey', { context: { key } })
    return { Bucket: address.bucket, Key: key }
  }
  const away = (key: string, cause: unknown) =>
    new AppError('filesAway', { retry: true, context: { key }, cause })
  return {
    async put(key, bytes, mime) {
      const command = new PutObjectCommand({ ...at(key), Body: bytes, ContentType: mime })
      await client.send(command).catch((cause: unknown) => {
        throw away(key, cause)
      })
    },
    async get(key) {
      const command = new GetObjectCommand(at(key))
      try {
        const bytes = await (await client.send(command)).Body?.transformToByteArray()
        return bytes === undefined ? null : new Uint8Array(bytes)
      } catch (cause) {
        if (isMissing(cause)) return null
        throw away(key, cause)
      }
    },
    async has(key) {
      const command = new HeadObjectCommand(at(key))
      try {
        await client.send(command)
        return true
      } catch (cause) {
        if (isMissing(cause)) return false
        throw away(key, cause)
      }
    },
  }
}

const opened = new Map<string, Files>()

/** The file store of the settings (FILES_URL and what belongs to it), one client per process. */
export function shopFiles(): Files {
  const { FILES_URL, FILES_BUCKET, FILES_REGION, FILES_KEY, FILES_SECRET } = env()
  const held = opened.get(FILES_URL)
  if (held) return held
  const files = s3Files({
    url: FILES_URL,
    bucket: FILES_BUCKET,
    region: FILES_REGION,
    key: FILES_KEY,
    secret: FILES_SECRET,
  })
  opened.set(FILES_URL, files)
  return files
}
