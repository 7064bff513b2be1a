/** Two faults that no check or swap of the book tells apart, and why that is left so (rule CB11). */
export type Unseparated = { faults: readonly [string, string]; reason: string }
