import { v7 } from 'uuid'
import type { Role } from '@/lib/model/role'
import type { Known } from '@/lib/sync/server/known'
import { planPush } from '@/lib/sync/server/plan'
import { readOp } from '@/lib/sync/server/read-ops'
import { RawDevice } from './raw-device'

const SHOP = v7()

/** One device, one machine and one open job, as the planner is told of them. */
export function world(roles: Role[] = ['mechanic']) {
  const device = new RawDevice({ shopId: SHOP, personId: v7() })
  const machineId = v7()
  const known: Known = {
    actor: { shopId: SHOP, personId: device.owner.personId, roles, name: null },
    deviceId: device.id,
    seen: new Map(),
    jobs: new Map(),
    closedHere: new Set(),
    at: { nowMs: Date.now(), seq: 100 },
    machines: new Map([
      [machineId, { isFleet: true, isDropped: false, isPurged: false, mergedInto: null }],
    ]),
    openersOn: new Map(),
    models: new Set(),
    entries: new Map(),
    deciding: new Map(),
    partRequests: new Map(),
    lines: new Set(),
    writes: new Map(),
    firsts: new Map(),
    advice: new Set(),
    withdrawals: new Set(),
    guideSafe: new Set(['tetherLook']),
  }
  const jobId = v7()
  const stand = {
    state: 'open',
    peopleState: 'withMachine',
    machineState: 'stranded',
    wayOut: null,
    place: null,
    openedBy: device.owner.personId,
    assignedTo: [],
  } as const
  return {
    device,
    machineId,
    jobId,
    known: { ...known, jobs: new Map([[jobId, stand]]) } as Known,
    stand,
  }
}

/** Reads and plans these ops. */
export const plan = (ops: unknown[], known: Known) => planPush(ops.map(readOp), known)
