import type { Job } from '@/lib/model/job'
import type { MachineRow } from '@/lib/model/machine'
import type { PartRequestRow } from '@/lib/model/part-request'
import type { AlsoEntered, JobSetting } from '@/lib/model/setting'
import { cancelLine, countLine } from '@/lib/shop/part-count'
import type { Op } from '@/lib/sync/protocol/op'

/** The job with one value set, as the shop will set it (M1). */
export function jobWith(job: Job, setting: JobSetting): Job {
  switch (setting.field) {
    case 'complaintWords':
      return { ...job, complaint: { ...job.complaint, words: setting.value } }
    case 'place':
      return { ...job, place: setting.value }
    case 'airTempC':
      return { ...job, airTempC: setting.value }
    case 'weather':
      return { ...job, weather: setting.value }
  }
}

/** A row without the values that were looked at (M4). */
export function withoutLooked<R extends { alsoEntered?: AlsoEntered[] | undefined }>(
  row: R,
  history: readonly string[],
): R {
  const left = row.alsoEntered?.filter((one) => !history.includes(one.id)) ?? []
  if (left.length === (row.alsoEntered?.length ?? 0)) return row
  const { alsoEntered: _, ...rest } = row
  return left.length === 0 ? (rest as R) : { ...row, alsoEntered: left }
}

/** A machine after an op on it; one taken back stays on the phone, marked, until the shop says so. */
export function applyToMachine(row: MachineRow | undefined, op: Op): MachineRow | undefined {
  if (op.kind === 'machine.add') return row ?? op.fields
  if (row === undefined) return undefined
  switch (op.kind) {
    case 'machine.set':
      return { ...row, [op.fields.field]: op.fields.value }
    case 'machine.settle':
      return withoutLooked(row, op.fields.history)
    case 'machine.drop':
      return { ...row, takenBack: true }
    default:
      return row
  }
}

type Line = PartRequestRow['lines'][number]

/** A line as its counter leaves it; what the shop would refuse leaves it as it is. */
function lineAfter(line: Line, change: (line: CountedLine) => CountedLine | undefined): Line {
  const after = change({ ...line, wanted: null, countedOut: false })
  if (after === undefined) return line
  const { wanted: _, countedOut: __, ...shown } = after
  return shown
}
type CountedLine = Line & { wanted: number | null; countedOut: boolean }

/** A part request after an op on its lines; one taken back stays, marked, until the shop says so. */
export function applyToRequest(
  row: PartRequestRow | undefined,
  op: Op,
  askedBy: string,
): PartRequestRow | undefined {
  if (op.kind === 'partRequest.ask') {
    const lines = op.fields.lines.map((line) => ({ ...line, state: 'asked' as const }))
    return row ?? { ...op.fields, askedBy, lines }
  }
  if (row === undefined) return undefined
  const each = (lineId: string, change: (line: CountedLine) => CountedLine | undefined) => ({
    ...row,
    lines: row.lines.map((line) => (line.id === lineId ? lineAfter(line, change) : line)),
  })
  switch (op.kind) {
    case 'partLine.add': {
      const { line } = op.fields
      if (row.lines.some((held) => held.id === line.id)) return row
      return { ...row, lines: [...row.lines, { ...line, state: 'asked' }] }
    }
    case 'partLine.cancel':
      return each(op.fields.lineId, cancelLine)
    case 'partLine.quantity': {
      const { lineId, by } = op.fields
      return each(lineId, (line) => countLine(line, by))
    }
    case 'partRequest.drop':
      return { ...row, takenBack: true }
    default:
      return row
  }
}
