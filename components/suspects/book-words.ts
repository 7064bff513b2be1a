/** Said beside suspects worked out with an older code book than an entry of the job (rule R23). */
export const behindWords = (version: number, newerSeen: number): string =>
  `An entry was written with code book version ${newerSeen}; this is worked out with version ${version}.`
