import { v7 } from 'uuid'

/** Where ids and other random figures come from. */
export type Ids = {
  /** A new UUIDv7 (RFC 9562). */
  next(): string
  /** An even random figure from 0 up to, not including, 1: for the jitter of retries. */
  share(): number
}

/** Ids of the machine's own random source. */
export const uuidv7: Ids = { next: () => v7(), share: () => Math.random() }
