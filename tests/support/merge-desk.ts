// The desk's reads and the merge routes, and one stranding that two people reported.

import { POST as postMerge } from '@/app/api/desk/jobs/[id]/merge/route'
import { GET as getDeskJob } from '@/app/api/desk/jobs/[id]/route'
import { POST as postUnmerge } from '@/app/api/desk/jobs/[id]/unmerge/route'
import { GET as getBoard } from '@/app/api/desk/jobs/route'
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { assignJob } from '@/db/queries/jobs'
import { type DeskJob, deskBoard, deskJob } from '@/lib/model/desk'
import { jobOpen, logAdd, note } from './field-ops'
import { placeAt } from './field-sets'
import { phoneOf, pullAll, type SyncWorld, signIn, sync } from './sync-world'

type Handler = typeof postMerge

/** The desk of shop A with a dispatcher signed in. */
export async function openMergeDesk(world: SyncWorld) {
  const desk = (await signIn(world.a, 'dispatcher')).cookie
  const personOf = (who: string) => world.a.people[who]?.id ?? ''
  const asked = (run: Handler, id: string, body: unknown = {}, cookie = desk) =>
    run(
      new Request(`http://shop.invalid/api/desk/x/${id}`, {
        method: 'POST',
        body: JSON.stringify(body),
        headers: { cookie },
      }),
      { params: Promise.resolve({ id }) },
    )
  const merge = (id: string, into: string, cookie = desk) => asked(postMerge, id, { into }, cookie)
  const unmerge = (id: string, cookie = desk) => asked(postUnmerge, id, {}, cookie)

  async function atDesk(id: string): Promise<DeskJob> {
    const request = new Request(`http://shop.invalid/api/desk/jobs/${id}`, {
      headers: { cookie: desk },
    })
    const answer = await getDeskJob(request, { params: Promise.resolve({ id }) })
    return deskJob.parse(await answer.json())
  }

  /** Open jobs on the board, with how many entries each shows. */
  async function onBoard(): Promise<Map<string, number>> {
    const request = new Request('http://shop.invalid/api/desk/jobs', { headers: { cookie: desk } })
    const board = deskBoard.parse(await (await getBoard(request)).json())
    return new Map(board.open.map((row) => [row.job.id, row.entries]))
  }

  /** A guide's job and a mechanic's, each with an entry; both phones hold their own. */
  async function twice() {
    const guide = await phoneOf(world.a, 'guide')
    const other = await phoneOf(world.a, 'second')
    const one = jobOpen(world.a.machineId, { place: placeAt(47.10031) })
    const two = jobOpen(world.a.machineId, { place: placeAt(47.1) })
    const [jobId, intoId] = [one.fields.id, two.fields.id]
    await sync(guide.device, [
      guide.device.op(one),
      guide.device.op(logAdd(guide.device, jobId, note('bogged to the frame'))),
    ])
    await sync(other.device, [
      other.device.op(two),
      other.device.op(logAdd(other.device, intoId, note('call taken'))),
    ])
    await asShop(world.a.id, async (tx) => {
      await assignJob(tx, { jobId: intoId, personId: personOf('second') })
      await takeChanges(tx, [{ entity: 'job', id: intoId, jobId: intoId, whole: true }])
    })
    await pullAll(guide.device, guide.cookie)
    await pullAll(other.device, other.cookie)
    return { guide, other, jobId, intoId }
  }

  return { asked, merge, unmerge, atDesk, onBoard, twice, personOf }
}

/** What was written, in the order shown. */
export const wordsOf = (found: DeskJob) =>
  found.entries.map(({ body }) => (body.kind === 'note' ? body.words : body.kind))
