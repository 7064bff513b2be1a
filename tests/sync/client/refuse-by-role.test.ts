import { describe, expect, test } from 'vitest'
import type { LogBody } from '@/lib/model/log-entry'
import type { Role } from '@/lib/model/role'
import { jobOpen, machineAdd } from '../../support/field-ops'
import { createPhone, MECHANIC, newIndexed } from '../../support/phone'
import { note, outbox } from '../../support/phone-world'

const noLine = () => Promise.reject(new TypeError('Failed to fetch'))
const as = (...roles: Role[]) => ({ ...MECHANIC, roles })

/** A phone of a person with these roles; nothing can be sent. */
const phoneAs = (roles: Role[], indexed = newIndexed()) =>
  createPhone({ fetch: noLine, ports: { actor: as(...roles), indexed } })

const check: LogBody = {
  kind: 'check',
  checkId: 'fuelPressure',
  outcome: 'good',
  asWritten: true,
  differed: null,
}

describe('what the shop must refuse by role is never kept', () => {
  test('[R22] a guide’s stranger’s machine is refused at once, with the job that hangs on it', async () => {
    const phone = await phoneAs(['guide'])
    const machine = machineAdd()
    await expect(phone.record([machine, jobOpen(machine.fields.id)])).rejects.toThrow('notAllowed')
    expect(await outbox(phone)).toEqual([])
    expect(await phone.rows('machine')).toEqual([])
    await phone.record([jobOpen(machine.fields.id)])
    expect(await outbox(phone)).toHaveLength(1)
    phone.kill()
  })

  test('[R22] a dispatcher’s phone keeps nothing and loses no draft by it', async () => {
    const phone = await phoneAs(['dispatcher'])
    const draft = phone.phone.drafts.of('note')
    draft.set('Half a sen')
    await draft.written()
    await expect(
      phone.record([note(phone, MECHANIC.personId, 'x')], { clearDrafts: ['note'] }),
    ).rejects.toThrow('notAllowed')
    expect(await outbox(phone)).toEqual([])
    expect(await phone.phone.core.db.draft.count()).toBe(1)
    phone.kill()
  })

  test('[R8] a guide corrects their own entry and not a mechanic’s', async () => {
    const indexed = newIndexed()
    const mechanic = await phoneAs(['mechanic'], indexed)
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    const { id: jobId } = job.fields
    const evidence = mechanic.phone.entry(jobId, check, { bookVersion: 1 })
    const theirs = { ...evidence, fields: { ...evidence.fields, authorId: jobId } }
    await mechanic.record([machine, job, theirs])
    mechanic.kill()
    const guide = await phoneAs(['guide'], indexed)
    const correct = (id: string) =>
      guide.phone.entry(
        jobId,
        { kind: 'correction', reason: 'Wrong' },
        { bookVersion: 1, supersedes: id },
      )
    await expect(guide.record([correct(theirs.fields.id)])).rejects.toThrow('notAllowed')
    const own = guide.phone.entry(jobId, { kind: 'note', words: 'x' }, { bookVersion: 1 })
    await guide.record([own, correct(own.fields.id)])
    expect(await outbox(guide)).toHaveLength(5)
    guide.kill()
  })

  test('[R22] the shop’s newest word on the roles counts', async () => {
    const phone = await phoneAs(['guide'])
    await expect(phone.record([machineAdd()])).rejects.toThrow('notAllowed')
    phone.phone.actor = as('mechanic')
    await phone.record([machineAdd()])
    expect(await outbox(phone)).toHaveLength(1)
    phone.kill()
  })
})
