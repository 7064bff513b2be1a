// What must hold at the shop: after every step what is cheap to ask, after the quiet all of it.
import { asShop } from '@/db/client'
import { verifyAudit } from '@/db/queries/audit'
import { verifyLog } from '@/db/queries/log-entries'
import { breaks } from './broken-rule'
import type { SimShop } from './shop-set'
import type { World } from './world'

/** P7: change numbers are dense, and the counter stands at the last one. */
export async function holdDense(world: World): Promise<void> {
  for (const shop of world.shops) {
    const { rows } = await world.admin.query(
      `select count(*)::float8 as count, coalesce(max(seq), 0)::float8 as last,
        (select seq::float8 from shop_counter where shop_id = $1) as counter
       from change_log where shop_id = $1`,
      [shop.id],
    )
    const { count, last, counter } = rows[0]
    const isWhole = count === last || world.hasPruned
    if (!isWhole || last !== counter) {
      breaks(
        'dense',
        `shop ${shop.name}: ${count} changes up to ${last}, the counter says ${counter}`,
      )
    }
  }
}

/** R23: every chain holds. */
export async function holdChains(shop: SimShop): Promise<void> {
  await asShop(shop.id, async (tx) => {
    const jobs = await tx.selectFrom('job').select('id').where('shopId', '=', shop.id).execute()
    for (const { id } of jobs) {
      const [log, audit] = [await verifyLog(tx, id), await verifyAudit(tx, id)]
      if (!log.ok) breaks('chains', `log of ${id}: ${JSON.stringify(log.problem)}`)
      if (!audit.ok) breaks('chains', `audit of ${id}: ${JSON.stringify(audit.problem)}`)
    }
    const whole = await verifyAudit(tx, null)
    if (!whole.ok) breaks('chains', `audit of the shop: ${JSON.stringify(whole.problem)}`)
  })
}

/** P11: no id of one shop's field work lies at the other. */
export async function holdApart(world: World): Promise<void> {
  for (const shop of world.shops) {
    for (const table of ['log_entry', 'job', 'part_request', 'advice', 'sync_op']) {
      const { rows } = await world.admin.query<{ device_id: string }>(
        `select distinct d.shop_id from ${table} t
         join device d on d.id = t.${DEVICE_COLUMN[table] ?? 'device_id'} where t.shop_id = $1 and d.shop_id <> $1`,
        [shop.id],
      )
      if (rows.length > 0) breaks('onlyOwnShop', `${table} of shop ${shop.name} has another's`)
    }
  }
}
const DEVICE_COLUMN: Record<string, string> = { job: 'opened_on', part_request: 'asked_on' }
