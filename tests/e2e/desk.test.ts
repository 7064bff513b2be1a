import { randomBytes } from 'node:crypto'
import { readFileSync } from 'node:fs'
import type { Page } from '@playwright/test'
import type { JobOpening } from '@/lib/model/job'
import type { LogBody } from '@/lib/model/log-entry'
import { type FieldDevice, hashOf, makeFieldDevice } from '../support/e2e/field-device'
import { expect, signIn, test } from '../support/e2e/test'
import { jobOpen, logAdd, note, partRequestAsk } from '../support/field-ops'

/** Unit 14 of the demo fleet, and a position of the demo world. */
const UNIT_14 = '01980000-0000-7000-8000-000000000301'
const place: JobOpening['place'] = {
  latitude: 47.1,
  longitude: -93.2,
  source: 'fix',
  accuracyMetres: 12,
  at: '2026-11-24T18:40:00.000Z',
  asTyped: null,
  words: null,
}
/** A picture of 180 x 180 that no run before has sent: viewers ignore what stands after a PNG's end. */
const newPicture = () =>
  Buffer.concat([readFileSync('public/icons/apple-180.png'), randomBytes(12)])

async function openJob(phone: FieldDevice, changes: Partial<JobOpening> = {}) {
  const words = `Dies after a moment ${Math.random().toString(36).slice(2, 8)}`
  const opening = jobOpen(UNIT_14, {
    place,
    openedAt: phone.device.now(),
    complaint: { words, symptom: 'startsThenDies', lampOn: true },
    ...changes,
  })
  await phone.send(opening)
  return { jobId: opening.fields.id, words }
}
const write = (phone: FieldDevice, jobId: string, ...bodies: LogBody[]) =>
  phone.send(...bodies.map((body) => logAdd(phone.device, jobId, body)))
const tag = (page: Page, words: string) => page.getByRole('link', { name: new RegExp(words, 'i') })
const isLive = (page: Page) =>
  expect(page.getByText('Live', { exact: true })).toBeVisible({ timeout: 30_000 })

/** Marks the document, so that a later look tells whether it was loaded anew. */
const mark = (page: Page) => page.evaluate(() => document.body.setAttribute('data-kept', 'yes'))
const expectKept = (page: Page) => expect(page.locator('body[data-kept=yes]')).toHaveCount(1)

test('[R19] the board, a job and the parts table follow the field without a reload', async ({
  server,
  desk,
  partsDesk,
}) => {
  const board = await desk.open('/login')
  await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
  await isLive(board)
  await mark(board)
  const counter = await partsDesk.open('/login')
  await signIn(counter, 'parts@demo.invalid', /\/desk\/parts$/)
  await isLive(counter)
  await mark(counter)

  const phone = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const { jobId, words } = await openJob(phone)
  await expect(tag(board, words)).toBeVisible()
  await expect(board.getByRole('status').filter({ hasText: words })).toHaveText(
    /J-\d{4} came onto the board/,
  )
  await tag(board, words).click()
  await expect(board).toHaveURL(new RegExp(`/desk/jobs/${jobId}$`))
  await expect(board.getByText('47.10000 −93.20000')).toBeVisible()
  await expect(board.getByText('±12 m')).toBeVisible()
  await expect(
    board.getByText('to dark out there').or(board.getByText('to first light out there')),
  ).toBeVisible()
  await expect(board.getByText('Suspects from the complaint')).toBeVisible()

  await write(phone, jobId, note('Belt smells burnt'), {
    kind: 'code',
    seen: { format: 'spn', spn: 1268, fmi: 3 },
    context: { module: 0, status: 'active', count: null, order: 1, photo: null },
  })
  await expect(board.getByText('Belt smells burnt')).toBeVisible()
  await expect(board.getByText('SPN 1268 FMI 3')).toBeVisible()
  await expect(board.getByText('Suspects after 2 entries')).toBeVisible()
  await expect(
    board.getByRole('listitem').filter({ hasText: 'Ignition coil' }).first(),
  ).toBeVisible()

  const bytes = newPicture()
  const hash = hashOf(bytes)
  await write(phone, jobId, {
    kind: 'photo',
    photo: { hash, bytes: bytes.length, mime: 'image/png', width: 180, height: 180 },
    caption: 'The coil seat',
  })
  await expect(board.getByText('The coil seat')).toBeVisible()
  const picture = board.getByRole('img', { name: 'The coil seat' })
  const missing = board.getByText('Photo still on the phone')
  await expect(missing).toBeVisible()
  await expect(
    board.getByText(/on the phone of .* \(Test phone\), .*last reached us/),
  ).toBeVisible()
  await expect(picture).toHaveCount(0)
  await phone.sendPhoto(bytes, 'image/png')
  await picture.scrollIntoViewIfNeeded()
  await expect(picture).toBeVisible()
  await expect(missing).toHaveCount(0)
  await expect(board.getByText(/on the phone of .* \(Test phone\), .*last reached us/)).toHaveCount(
    0,
  )
  await expect.poll(() => picture.evaluate((img: HTMLImageElement) => img.naturalWidth)).toBe(180)

  await phone.send(partRequestAsk(jobId, { askedAt: phone.device.now() }))
  await expect(board.getByRole('heading', { name: 'Parts asked for' })).toBeVisible()
  await expect(board.getByText('1 pc, genuine, today')).toBeVisible()
  await expect(counter.getByRole('row').filter({ hasText: words })).toContainText('Asked')
  await expectKept(board)
  await expectKept(counter)
})

test('[R19] says not live while the server is away, and misses nothing of what came meanwhile', async ({
  server,
  desk,
}) => {
  const phone = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const { jobId, words } = await openJob(phone)
  const board = await desk.open('/login')
  await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
  await isLive(board)
  await tag(board, words).click()
  await mark(board)
  await server.stop()
  await expect(board.getByText('Not live')).toBeVisible()
  await expect(board.getByText(/last heard \d\d:\d\d/)).toBeVisible()
  await server.start()
  await write(phone, jobId, note('Written while the desk was not looking'))
  await isLive(board)
  await expect(board.getByText('Written while the desk was not looking')).toBeVisible()
  await expectKept(board)
})

test('[R19] tabs of one browser share one stream, and the next takes it over', async ({
  server,
  desk,
}) => {
  const phone = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const { jobId } = await openJob(phone)
  const first = await desk.open('/login')
  await signIn(first, 'dispatcher@demo.invalid', /\/desk$/)
  await isLive(first)
  const second = await desk.context().newPage()
  let streams = 0
  second.on('request', (request) => {
    if (request.url().endsWith('/api/events')) streams += 1
  })
  await second.goto(`/desk/jobs/${jobId}`)
  await isLive(second)
  await write(phone, jobId, note('Heard through the first tab'))
  await expect(second.getByText('Heard through the first tab')).toBeVisible()
  expect(streams).toBe(0)
  await first.close()
  await expect.poll(() => streams, { timeout: 20_000 }).toBe(1)
  await write(phone, jobId, note('Heard by the second itself'))
  await expect(second.getByText('Heard by the second itself')).toBeVisible()
})

test('[R13] [R14] keys of the desk do what they say, for the roles that may', async ({
  server,
  desk,
  partsDesk,
}) => {
  const phone = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const { jobId, words } = await openJob(phone)
  await phone.send(partRequestAsk(jobId, { askedAt: phone.device.now() }))
  const board = await desk.open('/login')
  await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
  await tag(board, words).click()
  const counter = await partsDesk.open('/login')
  await signIn(counter, 'parts@demo.invalid', /\/desk\/parts$/)
  const row = counter.getByRole('row').filter({ hasText: words })

  await expect(board.getByText('Nobody’s yet: every mechanic sees it.')).toBeVisible()
  await expect(board.getByRole('button', { name: /^Work on/ })).toHaveCount(0)
  const action = board.waitForRequest((request) => request.method() === 'POST')
  await board.getByLabel('Give it to').selectOption({ label: 'Tove Marl, mechanic' })
  await board.getByRole('button', { name: 'Assign' }).click()
  await expect(board.getByRole('button', { name: 'Take off' })).toBeVisible()
  await expect(board.getByText('Assigned', { exact: true }).first()).toBeVisible()

  // The same action from the parts desk is refused by the server, key or no key.
  const posted = await action
  const refused = await counter.evaluate(
    async ({ url, headers, body }) => {
      const answer = await fetch(url, { method: 'POST', headers, body })
      return answer.text()
    },
    {
      url: posted.url(),
      headers: {
        'next-action': posted.headers()['next-action'] ?? '',
        'content-type': posted.headers()['content-type'] ?? '',
        accept: 'text/x-component',
      },
      body: (posted.postData() ?? '').replace('"assigned":true', '"assigned":false'),
    },
  )
  expect(refused).toContain('"kind":"forbidden"')
  await expect(board.getByRole('button', { name: 'Take off' })).toBeVisible()

  await row.getByRole('button', { name: /^Work on it\s+Ignition coil$/ }).click()
  await counter.getByRole('button', { name: 'Identified' }).click()
  await expect(counter.getByText('Type the part number.')).toBeVisible()
  await counter.getByLabel('Part number').fill('K-4410')
  await counter.getByRole('button', { name: 'Identified' }).click()
  await expect(row).toContainText('Identified')
  await expect(board.getByText('K-4410')).toBeVisible()
  await counter.getByLabel('Price of one, USD').fill('135.00')
  await counter.getByRole('button', { name: 'Quoted' }).click()
  await expect(row).toContainText('Quoted')
  await expect(board.getByText('135.00 USD')).toBeVisible()
  await counter.getByRole('button', { name: 'Cancel the line' }).press('Enter')
  await counter.getByRole('button', { name: 'Cancel it' }).click()
  await expect(row).toHaveCount(0)
  await expect(board.getByText('Cancelled')).toBeVisible()
})

test('[R13] [R25] a job is closed with its cause at the desk, reopened, and the log keeps both', async ({
  server,
  desk,
}) => {
  const phone = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const { jobId, words } = await openJob(phone)
  const board = await desk.open('/login')
  await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
  await board.goto(`/desk/jobs/${jobId}`)
  const aside = board.getByRole('region', { name: 'Daylight, hands, parts and closing' })
  const press = (name: string) => aside.getByRole('button', { name, exact: true }).click()
  await press('Close')
  await press('Close the job')
  await expect(aside.getByText('Choose how sure the cause is.')).toBeVisible()
  await aside.getByRole('radio', { name: /^Likely/ }).check({ force: true })
  const cause = aside.getByLabel('The cause', { exact: true })
  await expect(cause.getByRole('option', { name: /of 100$/ }).first()).toBeAttached()
  const first = (await cause.getByRole('option').nth(1).textContent()) ?? ''
  await cause.selectOption({ index: 1 })
  await aside.getByLabel('What was done, or why it ends here').fill('Towed to the shop')
  await press('Close the job')
  const log = board.getByRole('region', { name: 'The picked job' })
  const fault = first.replace(/, [<\d.]+ of 100$/, '')
  await expect(log.getByText(`Job closed. Cause likely: ${fault}. Towed to the shop`)).toBeVisible()
  const closed = board.getByRole('region', { name: 'Jobs' })
  await expect(closed.getByText('Closed in the last 24 hours')).toBeVisible()
  await expect(closed.getByRole('link', { name: new RegExp(words) })).toBeVisible()
  await press('Reopen')
  await press('Reopen the job')
  await expect(aside.getByText('Say why in a few words.')).toBeVisible()
  await aside.getByLabel('Why it is opened again').fill('It came back')
  await press('Reopen the job')
  await expect(log.getByText('Job reopened. It came back')).toBeVisible()
  await expect(aside.getByRole('button', { name: 'Close', exact: true })).toBeVisible()
})
