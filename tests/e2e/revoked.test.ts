// A lost phone in real browsers: taken out, hands over, is emptied; the owner accepts 6 and refuses 1 (S11).
import type { Page } from '@playwright/test'
import axe from 'axe-core'
import { makeFieldDevice } from '../support/e2e/field-device'
import { makePhone } from '../support/e2e/phone'
import type { TestServer } from '../support/e2e/server'
import { expect, signIn, THEMES, test } from '../support/e2e/test'
import { jobOpen } from '../support/field-ops'

async function findings(page: Page): Promise<string[]> {
  const found: string[] = []
  for (const theme of THEMES) {
    await page.evaluate((value) => {
      document.documentElement.dataset.theme = value
    }, theme)
    await page.evaluate(axe.source)
    const { violations } = await page.evaluate(() =>
      (window as unknown as { axe: typeof axe }).axe.run(),
    )
    for (const { id, nodes } of violations)
      found.push(...nodes.map(({ target }) => `${theme}: ${id} at ${target.join(' ')}`))
  }
  await page.evaluate(() => {
    document.documentElement.dataset.theme = 'day'
  })
  return found
}

const overflows = (page: Page) =>
  page.evaluate(() => document.documentElement.scrollWidth > window.innerWidth)

/** A new job, opened by the owner and seen by every mechanic; answers its address on a phone. */
async function openJob(server: TestServer, page: Page): Promise<string> {
  const opener = await makeFieldDevice(server.base, 'owner@demo.invalid')
  const opening = jobOpen('01980000-0000-7000-8000-000000000301', {
    openedAt: opener.device.now(),
    complaint: { words: `Went missing ${Date.now()}`, symptom: 'startsThenDies', lampOn: null },
  })
  await opener.send(opening)
  const href = `/field/jobs/${opening.fields.id}`
  await page.goto('/field/unsent')
  await page.getByRole('button', { name: /^(Call the shop now|Try sending now)$/ }).click()
  await page.goto('/field')
  await expect(page.locator(`a[href="${href}"]`).first()).toBeVisible()
  return href
}

/** Writes notes into a job's log. */
async function writeNotes(page: Page, job: string, words: string[]): Promise<void> {
  for (const one of words) {
    await page.goto(`${job}/note`)
    await page.getByRole('textbox').first().fill(one)
    await page.getByRole('button', { name: /^(Save|Write|Keep)/ }).click()
    await page.waitForURL(/\/log/)
  }
}

const storesOf = (page: Page) =>
  page.evaluate(async () => (await indexedDB.databases()).map((one) => one.name ?? ''))

test('[S11] a phone that was taken out hands over, empties itself, and the owner decides', async ({
  server,
  phone,
  desk,
  shot,
}) => {
  test.setTimeout(240_000)
  let page = await phone.open('/login')
  await signIn(page, 'second@demo.invalid', /\/field/)
  const job = await openJob(server, page)
  await page.waitForFunction(() => navigator.serviceWorker.controller !== null)
  await phone.flight(true)
  const words = Array.from({ length: 7 }, (_, at) => `Lost phone, note ${at + 1}`)
  await writeNotes(page, job, words)
  await page.goto('/field/about')
  await page.getByRole('button', { name: 'Sign out' }).click()
  await expect(page.getByRole('heading', { name: '7 things not sent' })).toBeVisible()
  await shot(page, 'sign-out-unsent-390')
  expect(await findings(page)).toEqual([])
  await page.getByRole('button', { name: 'Delete it instead' }).click()
  await expect(page.getByRole('heading', { name: 'Delete 7 things for good?' })).toBeVisible()
  await shot(page, 'sign-out-delete-390')
  expect(await findings(page)).toEqual([])
  await page.getByRole('button', { name: 'Keep everything' }).click()

  const owner = await desk.open('/login')
  await signIn(owner, 'owner@demo.invalid', /\/desk$/)
  await owner.getByRole('link', { name: 'Phones' }).click()
  const part = owner.getByRole('region', { name: /^Phone of Jory Fenn/ }).first()
  await part.getByRole('button', { name: 'Take this phone out' }).click()
  await part.getByLabel('Why').fill('Lost on the north trail')
  expect(await findings(owner)).toEqual([])
  await shot(owner, 'phones-take-out-1280')
  await part.getByRole('button', { name: 'Take it out' }).click()
  await part.getByRole('group').getByRole('button', { name: 'Take it out' }).click()
  await expect(part.getByText('taken out', { exact: true })).toBeVisible()

  await phone.flight(false)
  page = await phone.open('/field/unsent')
  await expect(page.getByText('The shop took this phone out.')).toBeVisible()
  const stores = await storesOf(page)
  expect(stores.filter((name) => /^farbench-[0-9a-f]{8}/.test(name))).toEqual([])
  expect((await phone.context().cookies()).filter((one) => one.name.includes('session'))).toEqual(
    [],
  )
  await page.goto('/login')
  await expect(page.getByText('was handed over to the owner, then deleted here')).toBeVisible()
  await shot(page, 'emptied-390')
  expect(await findings(page)).toEqual([])

  await owner.reload()
  await expect(part.getByText('In quarantine, 7 waiting')).toBeVisible()
  expect(await findings(owner)).toEqual([])
  await shot(owner, 'phones-1280')
  for (let left = 7; left > 1; left -= 1) {
    await part.getByRole('button', { name: 'Accept', exact: true }).first().click()
    await expect(part.getByText('accepted', { exact: true })).toHaveCount(8 - left)
  }
  await part.getByRole('button', { name: 'Refuse', exact: true }).click()
  await part.getByLabel('Why refuse this one').fill('Not about this machine')
  await part.getByRole('button', { name: 'Refuse this one' }).click()
  await expect(part.getByText('In quarantine, all decided')).toBeVisible()
  await expect(part.getByText('Refused: Not about this machine')).toBeVisible()
  const jobId = job.split('/')[3] ?? ''
  const told = await desk.context().request.get(`/api/desk/jobs/${jobId}`)
  const text = await told.text()
  expect(words.filter((one) => text.includes(one))).toHaveLength(6)
  await owner.setViewportSize({ width: 390, height: 844 })
  expect(await overflows(owner)).toBe(false)
  await shot(owner, 'phones-390')
  await owner.setViewportSize({ width: 320, height: 640 })
  expect(await overflows(owner)).toBe(false)
})

test('[P22] a phone whose store was cleared says at the next sign-in what was lost, once', async ({
  server,
}, info) => {
  test.setTimeout(180_000)
  const look = { width: 390, height: 844 }
  const phone = makePhone(info.outputPath('lost'), server.base, look)
  try {
    let page = await phone.open('/login')
    await signIn(page, 'second@demo.invalid', /\/field/)
    const job = await openJob(server, page)
    await writeNotes(page, job, ['Went out'])
    await page.goto('/field/unsent')
    await page.getByRole('button', { name: /^(Call the shop now|Try sending now)$/ }).click()
    await expect(page.getByText('Everything you recorded here is at the shop.')).toBeVisible()
    await page.waitForFunction(() => navigator.serviceWorker.controller !== null)
    await phone.flight(true)
    await writeNotes(page, job, ['Never sent 1', 'Never sent 2', 'Never sent 3'])
    // The browser clears the databases and keeps its local storage.
    await page.goto('/~offline')
    await page.evaluate(async () => {
      for (const { name } of await indexedDB.databases()) {
        if (name) indexedDB.deleteDatabase(name)
      }
    })
    await phone.flight(false)
    await phone.context().clearCookies({ name: /session/ })
    page = await phone.open('/login')
    await signIn(page, 'second@demo.invalid', /\/field/)
    const notice = page.getByRole('alert', { name: 'Work was lost' })
    await expect(notice).toContainText('Work was lost on this phone: 3 records, last kept on')
    expect(await findings(page)).toEqual([])
    await page.getByRole('button', { name: 'I have read it' }).click()
    await expect(notice).toBeHidden()
    await page.reload()
    await expect(page.getByRole('heading', { name: 'Jobs' })).toBeVisible()
    await expect(notice).toBeHidden()
  } finally {
    await phone.close()
  }
})
