// A lock between processes by a file that holds the id of its holder.
import { existsSync, mkdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { dirname } from 'node:path'

/** Waits for the lock, two minutes at most, and answers how to give it back. */
export async function holdLock(path) {
  mkdirSync(dirname(path), { recursive: true })
  for (let tries = 0; tries < 1200; tries++) {
    try {
      writeFileSync(path, String(process.pid), { flag: 'wx' })
      return () => rmSync(path, { force: true })
    } catch (error) {
      if (error.code !== 'EEXIST') throw error
      if (isAbandoned(path)) rmSync(path, { force: true })
      await new Promise((done) => setTimeout(done, 100))
    }
  }
  throw new Error(`Another start holds ${path}`)
}

/** Its holder is gone, or ended before it could write its id. */
function isAbandoned(path) {
  try {
    const holder = readFileSync(path, 'utf8')
    if (holder) return !existsSync(`/proc/${holder}`)
    return Date.now() - statSync(path).mtimeMs > 5000
  } catch {
    return false
  }
}
