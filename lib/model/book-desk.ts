import * as z from 'zod/mini'
import { bookWithdrawal, withdrawn } from './book-withdrawal'
import type { CodeBookItem } from './code-book'

/** The code book at the desk: what the owner's page reads. Unknown fields are ignored. */
const count = z.int().check(z.minimum(0))
const counts = z.record(z.string(), count)
const person = z.nullable(z.object({ id: z.string(), name: z.nullable(z.string()) }))

const leading = z.nullable(z.object({ name: z.string(), of100: z.number() }))

/** A job whose verdict a withdrawal changes: the likeliest suspect before and after. */
export const changedJob = z.object({
  jobId: z.string(),
  number: z.nullable(z.string()),
  state: z.string(),
  words: z.string(),
  before: leading,
  after: leading,
})
export type ChangedJob = z.infer<typeof changedJob>
export const changedJobsAnswer = z.object({ jobs: z.array(changedJob) })

/** How many items of each kind came, changed and went since the version it was made from. */
const since = z.nullable(
  z.object({
    version: z.int(),
    added: z.array(z.string()),
    changed: z.array(z.string()),
    gone: z.array(z.string()),
  }),
)

export const bookVersionRow = z.object({
  /** Null of the draft. */
  version: z.nullable(z.int()),
  state: z.enum(['draft', 'published', 'withdrawn']),
  hash: z.string(),
  at: z.string(),
  /** Who brought it, and who published it; null: it came with the program, or by command. */
  madeBy: person,
  publishedBy: person,
  note: z.nullable(z.string()),
  counts,
  sources: z.array(z.string()),
  since,
})
export type BookVersionRow = z.infer<typeof bookVersionRow>

const place = z.object({ file: z.string(), line: z.int(), column: z.int() })

/** POST /api/desk/codebook/import: one JSON file, or CSV files; `replace`: in place of the draft there is. */
export const bookImport = z.strictObject({
  files: z
    .array(z.strictObject({ name: z.string().check(z.maxLength(80)), text: z.string() }))
    .check(z.minLength(1), z.maxLength(20)),
  note: z.nullable(z.string().check(z.trim(), z.minLength(1), z.maxLength(500))),
  replace: z.boolean(),
})
export type BookImport = z.infer<typeof bookImport>

/** Something the checker finds in a book; `place`: where in the file, when it came from one. */
export const finding = z.object({
  kind: z.string(),
  id: z.string(),
  words: z.string(),
  place: z.optional(z.nullable(place)),
})
export type Finding = z.infer<typeof finding>

/** `taken` null: the files were wrong, and there is no draft of them. */
export const bookImported = z.object({
  taken: z.nullable(z.object({ hash: z.string(), items: count })),
  problems: z.array(z.object({ ...place.shape, words: z.string() })),
  findings: z.array(finding),
})
export type BookImported = z.infer<typeof bookImported>

/** Nothing is asked with these. */
export const noForm = z.strictObject({})

export const deskBook = z.object({
  versions: z.array(bookVersionRow),
  withdrawals: z.array(bookWithdrawal),
  /** How many people of the shop are told of a withdrawal, and the phones by the version they hold. */
  people: z.array(z.object({ id: z.string(), name: z.nullable(z.string()) })),
})
export type DeskBook = z.infer<typeof deskBook>

/** Something of the newest version that may be withdrawn by its name; of a limit, the check that has it. */
export const withdrawable = z.object({ what: withdrawn, id: z.string(), name: z.string() })
export type Withdrawable = z.infer<typeof withdrawable>
export const withdrawableAnswer = z.object({ items: z.array(withdrawable) })

const isItem = (item: unknown): boolean =>
  typeof item === 'object' &&
  item !== null &&
  'kind' in item &&
  'id' in item &&
  typeof item.kind === 'string' &&
  typeof item.id === 'string'

/** A whole version as the shop serves it, of whatever age: its items were in shape when it was published. */
export const servedBook = z.object({
  version: z.int(),
  hash: z.string(),
  publishedAt: z.string(),
  items: z.array(z.custom<CodeBookItem>(isItem)),
})
