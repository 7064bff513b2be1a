// The desk, which writes on as long as it gets through: machines, and who is on a job.
import { v7 } from 'uuid'
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { changeAssignment } from '@/db/queries/desk-writes'
import { insertMachines } from '@/db/queries/machines'
import { stateAfterAssigning } from '@/lib/shop/desk-moves'
import { machineOf, type TestShop } from '../support/shop-fixture'
import type { Draw } from '../sync/simulator/draw'
import type { FieldHand } from './field-hand'
import { type Ask, same } from './shop-proof'
import { broken } from './tally'

export class DeskHand {
  readonly #shop: TestShop
  readonly #draw: Draw
  readonly #hands: readonly FieldHand[]
  /** What it was told is done, and what nobody told it of: that may be there or not. */
  readonly machines: Written = { done: [], unsure: [] }
  readonly audits: Written = { done: [], unsure: [] }

  constructor(shop: TestShop, hands: readonly FieldHand[], draw: Draw) {
    this.#shop = shop
    this.#hands = hands
    this.#draw = draw
  }

  /** Writes until it is told to stop or a write fails. */
  async write(isOver: () => boolean): Promise<void> {
    while (!isOver()) {
      const done = this.#draw.chance(0.5) ? await this.#addMachine() : await this.#assign()
      if (!done) return
    }
  }

  async #addMachine(): Promise<boolean> {
    const id = v7()
    return await this.#told(this.machines, id, () =>
      asShop(this.#shop.id, async (tx) => {
        await insertMachines(tx, [machineOf(id)])
        await takeChanges(tx, [{ entity: 'machine', id, jobId: null }])
        return true
      }),
    )
  }

  /** Puts the mechanic who opened a job on it, or takes them off. */
  async #assign(): Promise<boolean> {
    const hand = this.#draw.oneOf(this.#hands)
    const jobId = this.#draw.pick(hand.jobs)
    if (jobId === undefined) return await this.#addMachine()
    const { id, name } = this.#shop.people.owner ?? broken('P11', 'a shop without an owner')
    const actor = { shopId: this.#shop.id, personId: id, roles: ['owner' as const], name }
    const auditId = v7()
    const assigned = this.#draw.chance(0.5)
    const { personId } = hand.device.owner
    const stamp = { auditId, at: new Date().toISOString() }
    return await this.#told(this.audits, auditId, async () => {
      let stood = false
      const done = await changeAssignment(
        actor,
        { jobId, personId, assigned, stamp },
        (job, whom) => {
          stood = job.assignedTo.includes(personId) === assigned
          return stateAfterAssigning(job, whom, assigned)
        },
      )
      // A job that has not come in yet, or stands so already, leaves no trace.
      return done.ok && !stood
    })
  }

  /** True when the write came through; what it answers says whether there is a trace of it. */
  async #told(written: Written, id: string, write: () => Promise<boolean>): Promise<boolean> {
    try {
      if (await write()) written.done.push(id)
      return true
    } catch {
      written.unsure.push(id)
      return false
    }
  }

  /** What was done is there once; what nobody told of is there once or not at all. Answers how much of that is. */
  async hold(ask: Ask): Promise<number> {
    let there = 0
    for (const [table, { done, unsure }] of [
      ['machine', this.machines],
      ['audit_entry', this.audits],
    ] as const) {
      const rows = await ask<{ id: string }>(
        `select id from ${table} where shop_id = $1 and id = any($2)`,
        [this.#shop.id, [...done, ...unsure]],
      )
      const ids = rows.map((row) => row.id)
      const isUnsure = new Set(unsure)
      same(
        'P4',
        `${table} of the desk`,
        done,
        ids.filter((id) => !isUnsure.has(id)),
      )
      there += ids.filter((id) => isUnsure.has(id)).length
    }
    return there
  }
}

type Written = { done: string[]; unsure: string[] }
