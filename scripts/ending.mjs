// Undoes what a script has started, in reverse order, whenever it ends: done, failed or told to stop.
// Made first of all, so that Ctrl-C in the first minute leaves nothing running.

/** `onSignal`: the exit code when told to stop; `last` is called just before the end, with the code. */
export function ending({ onSignal, last = (code) => code }) {
  const steps = []
  let begun = null

  async function undo(code) {
    let worst = code
    while (steps.length > 0) {
      try {
        await steps.pop()()
      } catch (problem) {
        console.error(problem)
        worst ||= 1
      }
    }
    process.exit(last(worst))
  }
  const end = (code) => {
    begun ??= undo(code)
    return begun
  }
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void end(onSignal))

  return {
    end,
    get begun() {
      return begun !== null
    },
    /** What to undo of the thing that is about to start. */
    later: (step) => steps.push(step),
    /** Runs the script itself: what it throws ends it with 1, unless it is ending already. */
    async around(work) {
      try {
        await work()
      } catch (problem) {
        if (begun === null) console.error(problem)
        await end(1)
      }
    },
  }
}
