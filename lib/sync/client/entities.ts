import * as z from 'zod/mini'
import { bag } from '@/lib/model/bag'
import { bookWithdrawal } from '@/lib/model/book-withdrawal'
import { job } from '@/lib/model/job'
import { type LogEntry, logRow } from '@/lib/model/log-entry'
import { machineRow } from '@/lib/model/machine'
import { machineModel } from '@/lib/model/machine-model'
import { meterProfile } from '@/lib/model/meter-profile'
import { partRequestRow } from '@/lib/model/part-request'
import { person } from '@/lib/model/person'
import { photoRow } from '@/lib/model/photo'
import { shop } from '@/lib/model/shop'

/** The hash of an entry's link in its chain is the shop's business; a brief answer leaves it out. */
const phoneLogRow = z.omit(logRow, { hash: true })
type PhoneLogRow = z.infer<typeof phoneLogRow>

/** What the phone keeps of what travels down, each with the shape it must have to be shown. */
const SHAPES = {
  shop,
  person,
  machineModel,
  machine: machineRow,
  meterProfile,
  bag,
  job,
  logEntry: phoneLogRow,
  partRequest: partRequestRow,
  photo: photoRow,
  bookWithdrawal,
} as const

export type StoredEntity = keyof typeof SHAPES
/** A row as a screen reads it. A log entry made here has no place in the shop's chain yet. */
export type RowOf<E extends StoredEntity> = E extends 'logEntry'
  ? PhoneLogRow | LogEntry
  : z.infer<(typeof SHAPES)[E]>

/** True for what this version of the app keeps; the rest of a pull is passed over. */
export const isStored = (entity: string): entity is StoredEntity => Object.hasOwn(SHAPES, entity)

/** The row in its shape, or undefined when it cannot be read. Fields this version does not know are left out. */
export function readRow(entity: StoredEntity, row: unknown): unknown {
  const shape: z.ZodMiniType = SHAPES[entity]
  const read = shape.safeParse(row)
  if (read.success) return read.data
  const known = withoutUnknown(row, read.error.issues)
  if (known === undefined) return undefined
  const again = shape.safeParse(known)
  return again.success ? again.data : undefined
}

type Issue = z.core.$ZodIssue

/** A copy without the fields the issues call unknown; undefined when anything else is wrong. */
function withoutUnknown(row: unknown, issues: Issue[]): unknown {
  const copy: unknown = structuredClone(row)
  for (const issue of issues) {
    if (issue.code !== 'unrecognized_keys') return undefined
    let at: unknown = copy
    for (const step of issue.path) at = (at as Record<PropertyKey, unknown> | null)?.[step]
    for (const key of issue.keys) delete (at as Record<string, unknown>)[key]
  }
  return copy
}
