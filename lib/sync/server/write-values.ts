import type { ShopTx } from '@/db/client'
import type { AuditEntry } from '@/db/queries/audit'
import type { Change } from '@/db/queries/changes'
import { lookAtWrites, saveFieldWrites } from '@/db/queries/field-history'
import { addPartLine, setDropped, setLineStand } from '@/db/queries/part-lines'
import { setJobValue, setMachineValue } from '@/db/queries/values'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Instant } from '@/lib/model/time'
import type { Effects } from './known'

/** Who writes, and when it came by the server's clock. */
export type Hand = { actor: Actor; deviceId: Id; at: Instant; newId: () => Id }

/** Writes values, lines and what was taken back; nothing of it costs a statement when there is none. */
export async function writeValues(tx: ShopTx, effects: Effects, hand: Hand): Promise<void> {
  const { actor, at } = hand
  for (const standing of effects.standing.values()) {
    if (standing.entity === 'job') await setJobValue(tx, standing.entityId, standing.setting)
    else await setMachineValue(tx, { ...standing, at })
  }
  await saveFieldWrites(
    tx,
    [...effects.fields.values()].flatMap(({ writes, ...place }) =>
      [...writes.values()].map((write) => ({ ...place, write })),
    ),
  )
  for (const { entityId, ids } of effects.looked) {
    await lookAtWrites(tx, { entityId, ids, by: actor.personId, at })
  }
  for (const added of effects.addedLines) await addPartLine(tx, added)
  for (const [lineId, stand] of effects.lineStands) await setLineStand(tx, { lineId, stand })
  for (const [id, { entity, isDropped, revived }] of effects.drops) {
    await setDropped(tx, { entity, id, droppedAt: isDropped ? at : null, revived })
  }
}

/** What the audit trail says of it: ids and fields, never what was written (R23). */
export function auditOfValues(
  effects: Effects,
  { actor, deviceId, at, newId }: Hand,
): AuditEntry[] {
  const by = { at, actorId: actor.personId, deviceId }
  const entries: AuditEntry[] = []
  const add = (entry: Pick<AuditEntry, 'jobId' | 'action' | 'entity' | 'entityId' | 'detail'>) =>
    entries.push({ id: newId(), ...by, ...entry })
  for (const { entity, entityId, setting } of effects.standing.values()) {
    const jobId = entity === 'job' ? entityId : null
    add({ jobId, action: `${entity}.set`, entity, entityId, detail: { field: setting.field } })
  }
  for (const { entity, entityId, ids } of effects.looked) {
    const jobId = entity === 'job' ? entityId : null
    add({ jobId, action: `${entity}.settle`, entity, entityId, detail: { history: ids } })
  }
  for (const [entityId, { entity, isDropped }] of effects.drops) {
    const jobId = effects.changedRequests.get(entityId) ?? null
    add({ jobId, action: `${entity}.drop`, entity, entityId, detail: { stands: !isDropped } })
  }
  return entries
}

/** Rows that these effects give a number, each once, with its state. */
export function changesOfValues(effects: Effects): Change[] {
  const changes = new Map<string, Change>()
  const add = (change: Change) => changes.set(`${change.entity} ${change.id}`, change)
  const touched = [...effects.fields.values(), ...effects.looked]
  for (const { entity, entityId: id } of touched) {
    if (entity === 'job') add({ entity, id, jobId: id })
    if (entity === 'machine') add({ entity, id, jobId: null })
  }
  for (const [id, jobId] of effects.changedRequests) add({ entity: 'partRequest', id, jobId })
  for (const [id, { entity, isDropped }] of effects.drops) {
    const jobId = effects.changedRequests.get(id) ?? null
    add({ entity, id, jobId, state: isDropped ? 'deleted' : 'present' })
  }
  return [...changes.values()]
}
