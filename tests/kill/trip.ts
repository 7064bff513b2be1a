// What the phone keeps in one round, in two saves: a job with entries; then a photo, a part request and advice.
import { createHash } from 'node:crypto'
import type { OpInput } from '@/lib/sync/protocol/op'
import { adviceKeep, jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import type { PhotoText } from './page/kill-page'

/** One save: what it adds, by op id and by row, the draft it ends, and whether the phone said that it is kept. */
export type Save = {
  ops: OpInput[]
  ids: string[]
  rows: string[]
  draft: string
  photo: PhotoText | null
  told: boolean
}

export type Trip = {
  n: number
  jobId: string
  lineId: string
  saves: Save[]
  /** The phone said that the drafts are kept. */
  drafted: boolean
}

const ROWS: Partial<Record<OpInput['kind'], string>> = {
  'machine.add': 'machine',
  'job.open': 'job',
  'log.add': 'logEntry',
  'partRequest.ask': 'partRequest',
}

function saveOf(ops: OpInput[], draft: string, photo: PhotoText | null): Save {
  const added = ops.flatMap((op) => {
    const { id } = op.fields as { id?: string }
    return id === undefined ? [] : [{ id, entity: ROWS[op.kind] }]
  })
  const rows = added.flatMap(({ id, entity }) => (entity === undefined ? [] : [`${entity}/${id}`]))
  return { ops, ids: added.map(({ id }) => id), rows, draft, photo, told: false }
}

/** `picture`: the bytes of a real picture; what is put behind its end makes each one another. */
export function makeTrip(device: RawDevice, n: number, picture: Buffer): Trip {
  const machine = machineAdd()
  const job = jobOpen(machine.fields.id)
  const jobId = job.fields.id
  const bytes = Buffer.concat([picture, Buffer.from(`trip ${n}`)])
  const hash = createHash('sha256').update(bytes).digest('hex')
  const photo = { hash, bytes: bytes.length, mime: 'image/jpeg' as const, width: 1, height: 1 }
  const ask = partRequestAsk(jobId)
  const lineId = ask.fields.lines[0]?.id ?? ''
  const one = [
    machine,
    job,
    logAdd(device, jobId, note(`Trip ${n}, smelled of fuel`)),
    logAdd(device, jobId, note(`Trip ${n}, plug was wet`)),
  ]
  const two: OpInput[] = [
    logAdd(device, jobId, { kind: 'photo', photo, caption: null }),
    ask,
    adviceKeep(jobId),
    // What counts shows at the shop at once whether it was taken twice.
    { kind: 'partLine.quantity', jobId, fields: { requestId: ask.fields.id, lineId, by: 1 } },
  ]
  const text = { hash, jobId, mime: photo.mime, base64: bytes.toString('base64') }
  return {
    n,
    jobId,
    lineId,
    saves: [saveOf(one, `one-${n}`, null), saveOf(two, `two-${n}`, text)],
    drafted: false,
  }
}

export const draftOf = (save: Save) => `half written under ${save.draft}`
