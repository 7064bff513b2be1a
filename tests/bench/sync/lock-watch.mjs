// Loaded before the server by `node --import` in the bench alone: notes how long each transaction holds the
// shop's counter, from the answer to the statement that locked it to the answer to its commit.
import { appendFileSync } from 'node:fs'
import pg from 'pg'

const LOCKS = /\b(lock_counter|take_changes|take_job_numbers|take_evidence)\s*\(/
const file = process.env.BENCH_LOCK_FILE
const held = new WeakMap()
let lines = ''

const query = pg.Client.prototype.query
pg.Client.prototype.query = function watched(config, ...rest) {
  const text = typeof config === 'string' ? config : (config?.text ?? '')
  const began = performance.now()
  const span = held.get(this)
  if (span) span.ownMs += began - span.lastMs
  const answer = query.call(this, config, ...rest)
  if (typeof answer?.then === 'function')
    answer.then(
      (told) => note(this, text, began, lockedAt(told)),
      () => note(this, 'rollback', began),
    )
  return answer
}

/** The statement that locks and writes at once says when it had the lock, by the clock of this machine. */
function lockedAt(told) {
  const ms = told?.rows?.[0]?.locked_ms
  return typeof ms === 'number' ? ms - performance.timeOrigin : null
}

function note(client, text, began, locked = null) {
  const now = performance.now()
  const span = held.get(client)
  if (/^\s*(commit|rollback)/i.test(text)) {
    held.delete(client)
    if (span && /commit/i.test(text))
      lines += `${JSON.stringify({ ...span, lastMs: undefined, heldMs: now - span.sinceMs, sinceMs: undefined })}\n`
    return
  }
  if (span) {
    span.statements += 1
    span.lastMs = now
  } else if (LOCKS.test(text)) {
    const sinceMs = locked ?? now
    const statements = locked === null ? 0 : 1
    held.set(client, { sinceMs, lastMs: now, waitMs: sinceMs - began, statements, ownMs: 0 })
  }
}

setInterval(() => {
  if (lines === '' || file === undefined) return
  appendFileSync(file, lines)
  lines = ''
}, 100).unref()
