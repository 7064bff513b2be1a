import { readdirSync, readFileSync, truncateSync } from 'node:fs'
import { join } from 'node:path'

/**
 * Chromium keeps IndexedDB in a LevelDB whose log it goes on writing after a crash, also when the crash has
 * left half a record at its end (google/leveldb issue 1287; "Reusing old log" in the folder's LOG). What is
 * written behind it cannot be read at the next start, and the browser then throws the whole store away. No
 * page can prevent that, so the loop does what the log's reader should have done: it cuts the half record
 * off, and counts it.
 */
export function mendTornLog(profile: string): boolean {
  const stores = join(profile, 'Default', 'IndexedDB')
  const folders = readdirSync(stores).filter((name) => name.endsWith('.leveldb'))
  const torn = folders.flatMap((folder) => {
    const logs = readdirSync(join(stores, folder)).filter((name) => name.endsWith('.log'))
    return logs.filter((name) => mendOne(join(stores, folder, name)))
  })
  return torn.length > 0
}

function mendOne(path: string): boolean {
  const bytes = readFileSync(path)
  const end = wholeEnd(bytes)
  if (end === bytes.length) return false
  truncateSync(path, end)
  return true
}

// LevelDB, doc/log_format.md: blocks of 32 KiB; records of check sum (4), length (2), type (1) and data.
const BLOCK = 32_768
const HEADER = 7
const [FULL, LAST] = [1, 4]

/** Where the last whole record ends; the length of the log when there is none but whole ones. */
export function wholeEnd(log: Buffer): number {
  let at = 0
  let whole = 0
  while (at < log.length) {
    const left = BLOCK - (at % BLOCK)
    if (left < HEADER) {
      // Too little for a header is filled up with zeros.
      if (whole === at) whole = Math.min(at + left, log.length)
      at += left
      continue
    }
    if (at + HEADER > log.length) break
    const end = at + HEADER + log.readUInt16LE(at + 4)
    if (end > log.length) break
    const type = log[at + 6]
    at = end
    if (type === FULL || type === LAST) whole = end
  }
  return whole
}
