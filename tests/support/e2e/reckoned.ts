import { specForEngine } from '@/components/engine/spec-kept'
import { workOut } from '@/components/engine/work'
import { entryWords } from '@/components/log/entry-words'
import { of100 } from '@/components/reading-strip/figures'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { indexBook } from '@/lib/diag/book-index'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { METER, UNITS } from '@/scripts/demo-shop'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })

const entryOf = (body: LogBody, at: number): LogEntry => ({
  id: `entry ${at}`,
  jobId: 'job',
  supersedes: null,
  happenedAt: new Date(60_000 * at).toISOString(),
  writtenAt: new Date(60_000 * at).toISOString(),
  zone: 'Etc/UTC',
  authorId: 'author',
  deviceId: 'phone',
  engineVersion: '1',
  bookVersion: 1,
  body,
})

/** What a line of the log says first, in the words of the repository's book. */
export const titleOf = (body: LogBody): string => entryWords(body, index).title

/**
 * The suspects of a job on a machine of the demo fleet, reckoned here by the engine from the book as it
 * stands in the repository: the order of the rows, and each chance as a row must show it.
 */
export function reckoned(
  unitNumber: string,
  complaint: { words: string; symptom: string; lampOn: boolean },
  bodies: readonly LogBody[],
): { order: string[]; shown(fault: string): string } {
  const unit = UNITS.find((one) => one.unitNumber === unitNumber)
  const model = DEMO_MODELS.find((one) => one.id === unit?.modelId)
  if (model === undefined) throw new Error(`no unit ${unitNumber} in the demo fleet`)
  const { suspects } = workOut(index, {
    case: {
      features: { ...model.features },
      spec: specForEngine(model.specSheet),
      job: { complaint },
      entries: bodies.map(entryOf),
      meter: METER,
    },
    means: null,
    outlookOf: [],
  }).belief
  const chances = new Map(suspects.map(({ fault, chance }) => [fault, of100(chance)]))
  return {
    order: suspects.map(({ fault }) => fault),
    shown: (fault) => chances.get(fault) ?? 'not a suspect',
  }
}
