import { describe, expect, test } from 'vitest'
import { jobOpen, machineAdd } from '../../support/field-ops'
import { createPhone, newIndexed } from '../../support/phone'
import { note } from '../../support/phone-world'

const noLine = () => Promise.reject(new TypeError('Failed to fetch'))

describe('[R8] drafts', () => {
  test('are there to the keystroke after a kill', async () => {
    const indexed = newIndexed()
    const phone = await createPhone({ fetch: noLine, ports: { indexed } })
    const draft = phone.phone.drafts.of('note')
    const text = 'Water in the connector of the coil'
    for (let end = 1; end <= text.length; end += 1) {
      draft.set(text.slice(0, end))
      // One turn of the store after each key, no more: typing does not wait for it.
      if (end % 5 === 0) await draft.written()
    }
    await draft.written()
    phone.kill()
    const again = await createPhone({ fetch: noLine, ports: { indexed } })
    const held = again.phone.drafts.of('note')
    await held.written()
    expect(held.watch.get()).toEqual({ ready: true, value: text, kept: 'kept' })
  })

  test('every key pressed while a write runs is in the next write', async () => {
    const indexed = newIndexed()
    const phone = await createPhone({ fetch: noLine, ports: { indexed } })
    const draft = phone.phone.drafts.of('note')
    const writes: unknown[] = []
    const put = phone.phone.core.db.draft.put.bind(phone.phone.core.db.draft)
    phone.phone.core.db.draft.put = (...args) => {
      writes.push(args[0])
      return put(...args)
    }
    for (let end = 1; end <= 50; end += 1) draft.set('x'.repeat(end))
    expect(draft.watch.get().value).toBe('x'.repeat(50))
    await draft.written()
    expect(writes).toHaveLength(1)
  })

  test('says kept only when the store holds what stands there', async () => {
    const phone = await createPhone({ fetch: noLine, ports: { indexed: newIndexed() } })
    const { drafts, core } = phone.phone
    const draft = drafts.of('note')
    const held = async () => (await core.db.draft.toCollection().primaryKeys()).length
    const seen: Promise<number>[] = []
    await draft.written()
    expect(draft.watch.get().kept).toBe('nothing')
    draft.watch.subscribe(() => {
      if (draft.watch.get().kept === 'kept') seen.push(held())
    })
    draft.set('W')
    expect(draft.watch.get().kept).toBe('writing')
    const first = draft.written()
    await Promise.resolve()
    await Promise.resolve()
    draft.set('Wa')
    await first
    // The store now holds 'W' and the screen shows 'Wa': that is not kept yet.
    expect(draft.watch.get()).toEqual({ ready: true, value: 'Wa', kept: 'writing' })
    await draft.written()
    expect(draft.watch.get().kept).toBe('kept')
    expect(await Promise.all(seen)).toEqual([1])
    await draft.clear()
    expect(draft.watch.get().kept).toBe('nothing')
  })

  test('says lost when the phone has no room, and kept again when it has', async () => {
    const phone = await createPhone({ fetch: noLine, ports: { indexed: newIndexed() } })
    const { drafts, core } = phone.phone
    const put = core.db.draft.put.bind(core.db.draft)
    core.db.draft.put = () => Promise.reject(new Error('QuotaExceededError')) as never
    const draft = drafts.of('note')
    draft.set('Coil')
    await draft.written()
    expect(draft.watch.get()).toEqual({ ready: true, value: 'Coil', kept: 'lost' })
    expect((await phone.see(phone.phone.unsent)).draftsKept).toBe(false)
    core.db.draft.put = put
    draft.set('Coil w')
    await draft.written()
    expect(draft.watch.get().kept).toBe('kept')
    expect((await phone.see(phone.phone.unsent)).draftsKept).toBe(true)
  })

  test('what is typed before the store was read is not overwritten by it', async () => {
    const indexed = newIndexed()
    const phone = await createPhone({ fetch: noLine, ports: { indexed } })
    phone.phone.drafts.of('note').set('Old')
    await phone.phone.drafts.of('note').written()
    phone.kill()
    const again = await createPhone({ fetch: noLine, ports: { indexed } })
    const draft = again.phone.drafts.of('note')
    draft.set('New')
    await draft.written()
    expect(draft.watch.get().value).toBe('New')
  })

  test('clearing forgets what was still to be written, and a new start after it stays', async () => {
    const indexed = newIndexed()
    const phone = await createPhone({ fetch: noLine, ports: { indexed } })
    const draft = phone.phone.drafts.of('note')
    draft.set('Thrown away')
    const cleared = draft.clear()
    draft.set('Kept')
    await cleared
    await draft.written()
    phone.kill()
    const again = await createPhone({ fetch: noLine, ports: { indexed } })
    const held = again.phone.drafts.of('note')
    await held.written()
    expect(held.watch.get().value).toBe('Kept')
  })

  test('a record takes its draft with it; a refused one leaves it', async () => {
    const indexed = newIndexed()
    const phone = await createPhone({ fetch: noLine, ports: { indexed } })
    const machine = machineAdd()
    const job = jobOpen(machine.fields.id)
    const draft = phone.phone.drafts.of('note')
    draft.set('Coil was wet')
    const bad = machineAdd({ year: 1800 })
    await expect(phone.record([bad], { clearDrafts: ['note'] })).rejects.toThrow()
    expect(draft.watch.get().value).toBe('Coil was wet')
    await phone.record([machine, job, note(phone, job.fields.id, 'Coil was wet')], {
      clearDrafts: ['note'],
    })
    expect(draft.watch.get()).toEqual({ ready: true, value: undefined, kept: 'nothing' })
    expect(await phone.phone.core.db.draft.count()).toBe(0)
  })
})
