import { gunzipSync } from 'node:zlib'
import { describe, expect, test } from 'vitest'
import { machineAdd, partRequestAsk } from '../../support/field-ops'
import { atWork, note, outbox, photoOf, states } from '../../support/phone-world'
import { ShopDouble } from '../../support/shop-double'

describe('the phone keeps and sends', () => {
  test('[P1] [P3] keeps a job without a line and hands everything over in one request', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job])
    await phone.record([note(phone, jobId, 'Coil was wet')])
    await phone.sync()
    expect(await states(phone)).toEqual(['waiting', 'waiting', 'waiting'])
    expect(await phone.see(phone.phone.log(jobId))).toMatchObject([
      { sent: false, order: null, entry: { body: { words: 'Coil was wet' } } },
    ])
    shop.fault = () => null
    await phone.sync()
    expect(shop.requests.filter((request) => request.path === '/api/sync')).toHaveLength(1)
    expect([...shop.ops.values()].map((op) => op.kind)).toEqual([
      'machine.add',
      'job.open',
      'log.add',
    ])
    expect(await phone.see(phone.phone.log(jobId))).toMatchObject([{ sent: true, order: 1 }])
    expect(await phone.rows('job')).toMatchObject([{ id: jobId, number: 'J-1', state: 'open' }])
    expect((await phone.see(phone.phone.unsent)).count).toBe(0)
  })

  test('[P4] sends again after a lost reply and ends in the same state', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.fault = () => ({ loseReply: true })
    await phone.record([machine, job, note(phone, jobId, 'One')])
    await phone.sync()
    expect(shop.ops.size).toBe(3)
    expect(await states(phone)).toEqual(['waiting', 'waiting', 'waiting'])
    shop.fault = () => null
    await phone.sync()
    await phone.sync()
    expect(shop.ops.size).toBe(3)
    expect(shop.rowsOf('logEntry')).toHaveLength(1)
    expect(await states(phone)).toEqual(['done', 'done', 'done'])
    expect(await phone.rows('logEntry')).toHaveLength(1)
  })

  test('[P5] [P16] sets a refused record aside with a sentence and sends the others', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.refuse = (op) =>
      op.kind === 'log.add' && op.fields.body.kind === 'note' && op.fields.body.words === 'Bad'
        ? { opId: op.id, result: 'rejected', code: 'forbidden', field: null, detail: null }
        : null
    const notes = ['Good', 'Bad', 'Fine'].map((words) => note(phone, jobId, words))
    await phone.record([machine, job, ...notes])
    await phone.sync()
    const view = await phone.see(phone.phone.unsent)
    expect(view).toMatchObject({ count: 1, stuckCount: 1 })
    expect(view.items[0]).toMatchObject({
      state: 'stuck',
      what: { kind: 'note', words: 'Bad' },
      reason: 'Your roles in this shop do not allow this.',
    })
    expect(shop.rowsOf('logEntry')).toHaveLength(2)
    const log = await phone.see(phone.phone.log(jobId))
    expect(log.map((line) => line.sent)).toEqual([true, true, false])
    await phone.sync()
    expect(shop.requests.at(-1)?.ops).toBe(0)
  })

  test('[P5] a blocked record waits and goes when its parent has landed', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    shop.refuse = (op) =>
      op.kind === 'log.add' ? { opId: op.id, result: 'blocked', on: jobId } : null
    await phone.record([machine, job, note(phone, jobId, 'Child')])
    await phone.sync()
    expect((await phone.see(phone.phone.unsent)).items).toMatchObject([{ state: 'blocked' }])
    shop.refuse = () => null
    await phone.sync()
    expect((await phone.see(phone.phone.unsent)).count).toBe(0)
    expect(shop.rowsOf('logEntry')).toHaveLength(1)
  })

  test('[fault 24] [P17] a captive portal marks nothing as sent', async () => {
    const { shop, phone, machine, job } = await atWork()
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job])
    const pages = [
      new Response('<html>Log in to the network</html>', {
        headers: { 'content-type': 'text/html' },
      }),
      new Response('', { status: 302, headers: { location: 'http://portal.invalid/' } }),
      new Response('{"ok":true}', { headers: { 'content-type': 'application/json' } }),
      new Response('{"protocol":1,"serv', { headers: { 'content-type': 'application/json' } }),
      new Response('<html>no</html>', { status: 404, headers: { 'content-type': 'text/html' } }),
    ]
    for (const instead of pages) {
      shop.fault = () => ({ instead })
      await phone.sync()
      expect(await states(phone)).toEqual(['waiting', 'waiting'])
      expect((await phone.see(phone.phone.unsent)).online).toBe(false)
    }
  })

  test('[fault 10] [P16] waits as long as the shop asks and sets nothing aside on its trouble', async () => {
    const delays: number[] = []
    const timer = {
      after: (ms: number) => {
        delays.push(ms)
        return () => undefined
      },
    }
    const { shop, phone, machine, job } = await atWork(new ShopDouble(), { timer })
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job])
    for (const status of [500, 503, 429, 408]) {
      shop.fault = () => ({
        instead: new Response('busy', { status, headers: { 'retry-after': '7' } }),
      })
      await phone.sync()
      expect(delays.at(-1)).toBeGreaterThanOrEqual(7000)
      expect(delays.at(-1)).toBeLessThan(7000 + 16_000)
    }
    expect(await states(phone)).toEqual(['waiting', 'waiting'])
  })

  test('[fault 10] [P15] halves until the one record is found that is too much, and keeps it', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    const words = Array.from({ length: 9 }, (_, index) => note(phone, jobId, `Note ${index}`))
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job, ...words])
    const bad = (await outbox(phone))[6]?.opId
    let sent: string[] = []
    shop.fault = ({ path, body }) => {
      if (path !== '/api/sync') return null
      const ops: { id: string }[] = JSON.parse(gunzipSync(body).toString()).ops
      sent = ops.map((op) => op.id)
      if (!sent.includes(bad ?? '')) return null
      return { instead: new Response('too much', { status: 413 }) }
    }
    await phone.sync()
    expect(shop.ops.size).toBe(10)
    expect((await outbox(phone)).filter((record) => record.state === 'stuck')).toMatchObject([
      { opId: bad, reason: 'too_big' },
    ])
  })

  test('[P18] hands records over without a session, and asks to sign in to fetch', async () => {
    const { shop, phone, machine, job } = await atWork()
    shop.session = false
    await phone.record([machine, job])
    await phone.sync()
    expect(shop.ops.size).toBe(2)
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ count: 0, needs: 'signIn' })
    expect(await states(phone)).toEqual(['taken', 'taken'])
    expect(await phone.rows('job')).toHaveLength(1)
    shop.session = true
    await phone.sync()
    expect(await phone.see(phone.phone.unsent)).toMatchObject({ needs: null })
    expect(await phone.rows('job')).toMatchObject([{ number: 'J-1' }])
  })

  test('[P18] enrols again when the shop has forgotten the phone', async () => {
    const { shop, phone, machine, job } = await atWork()
    await phone.record([machine, job])
    shop.forgetDevices()
    await phone.sync()
    expect(shop.ops.size).toBe(2)
    shop.forgetDevices()
    shop.session = false
    await phone.record([machineAdd()])
    await phone.sync()
    expect(await states(phone)).toEqual(['done', 'done', 'waiting'])
    expect((await phone.see(phone.phone.unsent)).needs).toBe('signIn')
  })

  test('[PH3] [PH4] photos go after every record, and their bytes leave the phone when the shop has them', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    const photo = photoOf(jobId)
    const body = {
      kind: 'photo' as const,
      photo: {
        hash: photo.hash,
        bytes: photo.bytes.byteLength,
        mime: photo.mime,
        width: 1,
        height: 1,
      },
      caption: null,
    }
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job, phone.phone.entry(jobId, body, { bookVersion: 1 })], {
      photos: [photo],
    })
    await phone.record([partRequestAsk(jobId)])
    expect((await phone.see(phone.phone.unsent)).items.map((item) => item.kind)).toEqual([
      'machine.add',
      'job.open',
      'log.add',
      'partRequest.ask',
      'photoBytes',
    ])
    shop.fault = () => null
    await phone.sync()
    expect(shop.requests.map((request) => request.path)).toEqual([
      '/api/sync',
      '/api/photos',
      '/api/photos',
      // The shop was told of a photo that had not gone: it hears that it has.
      '/api/sync',
    ])
    expect(Buffer.from(shop.photos.get(photo.hash) ?? [])).toEqual(Buffer.from(photo.bytes))
    const view = await phone.see(phone.phone.photo(photo.hash))
    expect(view).toMatchObject({
      onPhone: false,
      url: `/api/photos/${photo.hash}?size=show`,
      thumb: expect.stringMatching(/^blob:/),
    })
    expect(await phone.phone.core.db.photoBytes.count()).toBe(0)
    expect((await phone.see(phone.phone.unsent)).count).toBe(0)
  })

  test('[P23] exports unsent work as a file without a line', async () => {
    const { shop, phone, machine, job, jobId } = await atWork()
    const photo = photoOf(jobId)
    shop.fault = () => ({ noLine: true })
    await phone.record([machine, job, note(phone, jobId, 'Kept')], { photos: [photo] })
    const [made] = await phone.phone.exportFiles()
    const file = JSON.parse(JSON.parse((await made?.text()) ?? '').body)
    expect(file.ops.map((one: { op: { dseq: number } }) => one.op.dseq)).toEqual([1, 2, 3])
    expect(file.ops[2].op.fields.body.words).toBe('Kept')
    expect(Buffer.from(file.photos[0].base64, 'base64')).toEqual(Buffer.from(photo.bytes))
  })
})
