/** A broken promise: which one, and what was seen. */
export type Broken = { rule: string; what: string; cause?: unknown }

/** Thrown where it is found, so that the run ends there. */
export class BrokenRule extends Error {
  readonly broken: Broken
  constructor(broken: Broken) {
    super(`${broken.rule}: ${broken.what}`)
    this.broken = broken
  }
}

/** Ends the run: this promise does not hold. */
export function breaks(rule: string, what: string): never {
  throw new BrokenRule({ rule, what })
}
