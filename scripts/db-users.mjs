// Who uses the server of this checkout: one file for each process, so that the last one to leave stops
// it, also after a start that was killed and could not. Called under db.mjs's lock.
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

/** Stands for somebody who started the server by hand, or before this list was kept: nobody stops it. */
const KEPT = 'kept'

/** Notes this process. `fresh`: the server was started just now, so whoever is noted is gone. */
export function enter(folder, { fresh }) {
  if (fresh) rmSync(folder, { recursive: true, force: true })
  const known = fresh || existsSync(folder)
  mkdirSync(folder, { recursive: true })
  if (!known) keep(folder)
  writeFileSync(join(folder, String(process.pid)), bornAt(process.pid))
}

/** The server stays until it is stopped by hand. */
export function keep(folder) {
  mkdirSync(folder, { recursive: true })
  writeFileSync(join(folder, KEPT), '')
}

/** Takes this process off the list and answers whether nobody is left who needs the server. */
export function leave(folder) {
  rmSync(join(folder, String(process.pid)), { force: true })
  const names = existsSync(folder) ? readdirSync(folder) : [KEPT]
  return names.every((name) => name !== KEPT && !lives(folder, name))
}

function lives(folder, name) {
  const born = bornAt(name)
  return born !== '' && born === readOr(join(folder, name))
}

/** When a process began, in clock ticks since boot, as an id may be given twice; '' when there is none. */
function bornAt(pid) {
  const stat = readOr(`/proc/${pid}/stat`)
  return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19] ?? ''
}

function readOr(path) {
  try {
    return readFileSync(path, 'utf8')
  } catch {
    return ''
  }
}
