import { sql } from 'kysely'
import type { Id } from '@/lib/model/id'
import type { JobSetting, MachineSetting } from '@/lib/model/setting'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'

/** Writes one value into a job's row. Take a change number (job). */
export async function setJobValue(tx: ShopTx, jobId: Id, setting: JobSetting): Promise<void> {
  await tx
    .updateTable('job')
    .set(columnOf(setting))
    .where('shopId', '=', tx.shopId)
    .where('id', '=', jobId)
    .execute()
}

function columnOf(setting: JobSetting) {
  switch (setting.field) {
    case 'complaintWords':
      return {
        complaint: sql<string>`jsonb_set(complaint, '{words}', to_jsonb(${setting.value}::text))`,
      }
    case 'place':
      return { place: JSON.stringify(setting.value) }
    case 'airTempC':
      return { airTempC: setting.value }
    case 'weather':
      return { weather: setting.value }
  }
}

/** Writes one value into a machine's row. Take a change number (machine). */
export async function setMachineValue(
  tx: ShopTx,
  { entityId, setting, at }: { entityId: Id; setting: MachineSetting; at: Instant },
): Promise<void> {
  await tx
    .updateTable('machine')
    .set({ [setting.field]: setting.value, updatedAt: at })
    .where('shopId', '=', tx.shopId)
    .where('id', '=', entityId)
    .execute()
}
