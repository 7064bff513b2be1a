import { v7 } from 'uuid'
import type { Phone } from '@/lib/sync/client/phone'
import { record } from '@/lib/sync/client/record'
import type { OpInput } from '@/lib/sync/protocol/op'

/** Keeps ops without asking the phone's own gate: what a changed app, or one with old roles, would send. */
export async function recordPastGate(phone: Phone, ops: readonly OpInput[]): Promise<void> {
  await record(phone.core, {
    ops,
    ids: ops.map(() => v7()),
    deviceId: phone.deviceId,
    nowMs: phone.stamp.now(),
    photos: [],
    clearDrafts: [],
  })
}
