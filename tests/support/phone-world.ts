import { createHash } from 'node:crypto'
import type { OpInput } from '@/lib/sync/protocol/op'
import { jobOpen, machineAdd } from './field-ops'
import { createPhone, type TestPhone } from './phone'
import { jpegOf } from './pictures'
import { ShopDouble } from './shop-double'

/** A note as the phone writes it. */
export const note = (of: TestPhone, jobId: string, words: string): OpInput =>
  of.phone.entry(jobId, { kind: 'note', words }, { bookVersion: 1 })

/** A phone that the shop knows, with one job of its own. */
export async function atWork(
  shop = new ShopDouble(),
  options: Parameters<typeof createPhone>[0]['ports'] = {},
) {
  const phone = await createPhone({ fetch: shop.fetch, ports: options, name: 'one' })
  await phone.phone.enrol()
  const machine = machineAdd()
  const job = jobOpen(machine.fields.id)
  return { shop, phone, machine, job, jobId: job.fields.id }
}

export const outbox = (of: TestPhone) => of.phone.core.db.outbox.toArray()
export const states = async (of: TestPhone) => (await outbox(of)).map((record) => record.state)
/** A small real picture of a job. */
export const photoOf = (jobId: string) => {
  const bytes = new Uint8Array(jpegOf())
  const hash = createHash('sha256').update(bytes).digest('hex')
  const thumb = new Uint8Array([1, 2, 3]).buffer
  return { hash, jobId, bytes: bytes.buffer, mime: 'image/jpeg' as const, thumb }
}

/** Throws at the n-th step of the store, as if the process had been killed there. */
export function killer(at: number) {
  let steps = 0
  return {
    died: () => steps >= at,
    step: () => {
      steps += 1
      if (steps >= at) throw new Error('killed')
    },
  }
}
