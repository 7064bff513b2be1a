import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { jobOpen, machineAdd } from '../support/field-ops'
import { createPhone } from '../support/phone'
import { note } from '../support/phone-world'
import { RealShop } from '../support/real-shop'
import { openSyncWorld, type SyncWorld, signIn } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

async function phoneFor(who: string) {
  const { cookie } = await signIn(world.a, who)
  const person = world.a.people[who]
  if (!person) throw new Error(who)
  const shop = new RealShop(cookie)
  const actor = { shopId: world.a.id, personId: person.id, roles: person.roles, name: person.name }
  const phone = await createPhone({ fetch: shop.fetch, ports: { actor } })
  await phone.phone.enrol()
  return { phone, shop }
}

/** A job of the mechanic that the owner closes while the mechanic is out of signal. */
async function closedMeanwhile() {
  const { phone, shop } = await phoneFor('mechanic')
  const machine = machineAdd()
  const job = jobOpen(machine.fields.id)
  const jobId = job.fields.id
  await phone.record([machine, job])
  const desk = await phoneFor('owner')
  await desk.phone.sync()
  const close = { from: 'open', to: 'closed', reason: null } as const
  shop.fault = 'noLine'
  return { phone, shop, desk, jobId, close }
}

describe('[R13] a job closed at the desk while the field still writes', () => {
  it('is open again by the entry, and the phone that wrote it says so until it is seen', async () => {
    const { phone, shop, desk, jobId, close } = await closedMeanwhile()
    await phone.record([note(phone, jobId, 'Still at it')])
    await desk.phone.record([{ kind: 'job.move', jobId, fields: close }])
    expect(await phone.see(phone.phone.notices(jobId))).toEqual([])
    shop.fault = 'loseReply'
    await phone.sync()
    shop.fault = 'none'
    await phone.sync()
    expect(await phone.rows('job')).toMatchObject([{ id: jobId, state: 'open' }])
    const told = () => phone.phone.notices(jobId)
    await phone.sync()
    expect(await phone.see(told())).toMatchObject([{ jobId, what: 'reopened' }])
    expect((await phone.see(phone.phone.unsent)).count).toBe(0)
    phone.kill()
    const again = await createPhone({
      fetch: shop.fetch,
      ports: { actor: phone.phone.actor, indexed: phone.indexed },
    })
    await again.phone.noticed(jobId)
    await again.sync()
    expect(await again.see(again.phone.notices(jobId))).toEqual([])
  })

  it('says nothing where the job was open all the time', async () => {
    const { phone, shop, jobId } = await closedMeanwhile()
    await phone.record([note(phone, jobId, 'Still at it')])
    shop.fault = 'none'
    await phone.sync()
    expect(await phone.see(phone.phone.notices(jobId))).toEqual([])
  })
})
