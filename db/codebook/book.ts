import type { CodeBookItem } from '@/lib/model/code-book'
import { assemble, type Chapter } from './chapter'
import { CHARGE } from './chapter-charge'
import { DIES } from './chapter-dies'
import { DRIVE } from './chapter-drive'
import { MISHAP } from './chapter-mishap'
import { RUN } from './chapter-run'
import { STARTING } from './chapter-start'
import { itemsOf } from './items'
import type { Unseparated } from './unseparated'

/** The chapters in their order: a later one builds on what stands in an earlier one. */
const CHAPTERS: readonly Chapter[] = [DIES, RUN, STARTING, CHARGE, DRIVE, MISHAP]

const book = assemble(CHAPTERS)

/** Pairs of faults that no check or swap of the book tells apart, each with its reason (rule CB11). */
export const UNSEPARATED: readonly Unseparated[] = book.unseparated

/** The whole code book, in the order it is published. */
export const BOOK_ITEMS: CodeBookItem[] = itemsOf(book)
