// Loaded before the server by `node --import` in the bench alone: notes how long each transaction holds the
// shop's counter, from the answer to the statement that locked it to the answer to its commit.
import { appendFileSync } from 'node:fs'
import pg from 'pg'

const LOCKS = /\b(lock_counter|take_changes|take_job_numbers)\s*\(/
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
      () => note(this, text, began),
      () => note(this, 'rollback', began),
    )
  return answer
}

function note(client, text, began) {
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
    held.set(client, { sinceMs: now, lastMs: now, waitMs: now - began, statements: 0, ownMs: 0 })
  }
}

setInterval(() => {
  if (lines === '' || file === undefined) return
  appendFileSync(file, lines)
  lines = ''
}, 100).unref()
