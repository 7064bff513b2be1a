/** Checks the repository's code book with its demo models: one line per finding, exit 1 on any. */
import { BOOK_ITEMS, UNSEPARATED } from '@/db/codebook/book'
import { shelve } from '@/db/codebook/book-problem'
import { checkBook } from '@/db/codebook/check-book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { sameRows } from '@/db/codebook/same-rows'

const problems = checkBook(BOOK_ITEMS, DEMO_MODELS, UNSEPARATED)
for (const { kind, id, words } of problems) console.log(`${kind}: ${id}: ${words}`)

const count = (kind: string) => BOOK_ITEMS.filter((item) => item.kind === kind).length
const kinds = ['symptom', 'fault', 'check', 'swap', 'spn', 'pcode', 'failure']
console.log(
  `${BOOK_ITEMS.length} items (${kinds.map((k) => `${k} ${count(k)}`).join(', ')}), ` +
    `${DEMO_MODELS.length} models: ${problems.length} findings`,
)
const { rows, shared } = sameRows(shelve(BOOK_ITEMS))
console.log(`${shared} of ${rows} rows stand in more than five checks or swaps`)
process.exitCode = problems.length > 0 ? 1 : 0
