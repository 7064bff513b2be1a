import type { BoardJob, DeskBoard } from '@/lib/model/desk'
import { counted } from '../../field/words'

const nameOf = ({ job }: BoardJob) => job.number ?? 'A job without a number'

/** What changed between two readings of the board, one sentence each, for people who do not see it move. */
export function boardNews(before: DeskBoard, after: DeskBoard): string[] {
  const known = new Map([...before.open, ...before.closed].map((row) => [row.job.id, row]))
  return [...after.open, ...after.closed].flatMap((row) => {
    const old = known.get(row.job.id)
    // New, reopened, unmerged or assigned: the board does not tell which.
    if (!old)
      return [
        `${nameOf(row)} came onto the board: ${row.job.complaint.words}, ${row.machineWords}.`,
      ]
    const news: string[] = []
    const entries = row.entries - old.entries
    if (entries > 0) news.push(`${counted(entries, 'new entry', 'new entries')} on ${nameOf(row)}.`)
    if (row.partsOpen > old.partsOpen) news.push(`Parts asked for on ${nameOf(row)}.`)
    if (row.photosMissing < old.photosMissing)
      news.push(`A photo or voice note of ${nameOf(row)} arrived.`)
    if (row.job.state === 'closed' && old.job.state !== 'closed')
      news.push(`${nameOf(row)} closed.`)
    return news
  })
}
