import { randomBytes } from 'node:crypto'
import { mkdir, open, readFile, rename, rm, stat } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { env } from '@/lib/env'
import { AppError } from '@/lib/model/result'

/** Whole files by key. Keys are `folder/name` of letters, digits, dot and hyphen. */
export type Files = {
  /** Keeps the bytes; an existing file of that key is replaced at once or not at all. */
  put(key: string, bytes: Uint8Array): Promise<void>
  /** The bytes, or null when there are none under that key. */
  get(key: string): Promise<Uint8Array<ArrayBuffer> | null>
  has(key: string): Promise<boolean>
}

const KEY = /^[A-Za-z0-9-]{1,64}\/[A-Za-z0-9][A-Za-z0-9.-]{0,127}$/

const isMissing = (error: unknown): boolean =>
  error instanceof Error && 'code' in error && error.code === 'ENOENT'

/**
 * Files in a local folder. A file is written beside its place, brought to the disk and then moved, so
 * that a crash leaves the old one, the new one or none, never half.
 */
function localFiles(folder: string): Files {
  const pathOf = (key: string): string => {
    if (!KEY.test(key)) throw new AppError('badFileKey', { context: { key } })
    return join(folder, key)
  }
  return {
    async put(key, bytes) {
      const path = pathOf(key)
      await mkdir(dirname(path), { recursive: true, mode: 0o700 })
      const beside = `${path}.${randomBytes(6).toString('hex')}.part`
      try {
        const file = await open(beside, 'wx', 0o600)
        try {
          await file.writeFile(bytes)
          await file.sync()
        } finally {
          await file.close()
        }
        await rename(beside, path)
      } catch (cause) {
        await rm(beside, { force: true })
        throw new AppError('fileNotKept', { retry: true, context: { key }, cause })
      }
    },
    async get(key) {
      try {
        const bytes = await readFile(pathOf(key))
        return new Uint8Array(bytes.buffer as ArrayBuffer, bytes.byteOffset, bytes.byteLength)
      } catch (error) {
        if (isMissing(error)) return null
        throw error
      }
    },
    async has(key) {
      try {
        return (await stat(pathOf(key))).isFile()
      } catch (error) {
        if (isMissing(error)) return false
        throw error
      }
    },
  }
}

/** The file store of the settings (FILES_DIR). */
export const shopFiles = (): Files => localFiles(env().FILES_DIR)
