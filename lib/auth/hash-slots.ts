/**
 * Lets few jobs run at once and few wait, since one password check takes 128 MiB and a third of a second
 * of a core: without a bound a crowd of sign-ins would take the server's memory and its threads. Two run
 * and 40 wait (common practice, no source); whoever comes later is told at once that the server is busy.
 */
export class BusyError extends Error {
  constructor() {
    super('busy')
    this.name = 'BusyError'
  }
}

/** Answers a function that runs what it is given, `atOnce` at a time and in turn, or throws BusyError. */
export function slots(atOnce: number, mayWait: number) {
  const waiting: (() => void)[] = []
  let running = 0
  return async function inTurn<T>(work: () => Promise<T>): Promise<T> {
    if (running >= atOnce) {
      if (waiting.length >= mayWait) throw new BusyError()
      await new Promise<void>((turn) => waiting.push(turn))
    } else running += 1
    try {
      return await work()
    } finally {
      // The slot goes to the next in line; only an empty line frees it.
      const next = waiting.shift()
      if (next) next()
      else running -= 1
    }
  }
}

/** The slots of password hashes in this process. */
export const hashInTurn = slots(2, 40)
