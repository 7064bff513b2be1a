import { rowsTouched } from './apply-op'
import { commit, noWrites } from './commit'
import type { Core } from './core'
import { rowKey } from './phone-db'
import { readOverlay, rebasedRow } from './rebase'

/** Works out the rows of ops that a sender without the store key has marked. */
export async function settleRows(core: Core): Promise<void> {
  const marked = core.db.outbox.where('unsettled').equals(1)
  if ((await marked.count()) === 0) return
  await commit(core, async () => {
    const writes = noWrites()
    const overlay = await readOverlay(core)
    for (const record of await marked.toArray()) {
      writes.outbox.push({ ...record, unsettled: 0 })
      for (const at of rowsTouched(await core.cache.op(core.keys.outbox, record))) {
        const held = await core.db.row.get(rowKey(at.entity, at.id))
        const row = held && held.base !== null && (await rebasedRow(core, held.key, held, overlay))
        if (row) writes.rows.push(row)
      }
    }
    return writes
  })
}
