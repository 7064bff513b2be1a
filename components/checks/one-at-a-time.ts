/**
 * A way to run things one at a time: a call that comes while another is under way does nothing and answers
 * `busy`. Choice: a second tap of the same hand comes before a screen can draw its key as taken, so the
 * drawing alone does not keep it from recording twice.
 */
export function oneAtATime<R>(busy: R): (run: () => Promise<R>) => Promise<R> {
  let running = false
  return async (run) => {
    if (running) return busy
    running = true
    try {
      return await run()
    } finally {
      running = false
    }
  }
}
