import type { Page } from '@playwright/test'
import { type FieldDevice, makeFieldDevice } from '../support/e2e/field-device'
import { expect, signIn, test } from '../support/e2e/test'
import { jobOpen, logAdd, note, partRequestAsk } from '../support/field-ops'
import { lineOf, placeAt } from '../support/field-sets'

/** Unit 14 of the demo fleet. */
const UNIT_14 = '01980000-0000-7000-8000-000000000301'
const key = (page: Page, name: string | RegExp) =>
  page.getByRole('button', { name, exact: typeof name === 'string' })
const follow = (page: Page, name: string) => page.getByRole('link', { name, exact: true }).click()

async function openJob(phone: FieldDevice, words: string) {
  const opening = jobOpen(UNIT_14, {
    openedAt: phone.device.now(),
    place: placeAt(47.1),
    complaint: { words, symptom: 'startsThenDies', lampOn: true },
  })
  const jobId = opening.fields.id
  await phone.send(opening, logAdd(phone.device, jobId, note(`First look, ${words}`)))
  return jobId
}

test('[M1] [M4] [M6] [M9] one stranding, two phones, one desk', async ({
  server,
  phone,
  desk,
  shot,
}) => {
  test.setTimeout(300_000)
  const other = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const mark = Date.now() % 100_000
  const [one, two] = [`Bogged to the frame ${mark}`, `Call from the gate ${mark}`]
  const jobId = await openJob(other, one)
  const intoId = await openJob(other, two)
  const line = lineOf({ words: 'Tow strap', quantity: 1 })
  await other.send(partRequestAsk(jobId, { lines: [line] }))
  const page = await phone.open('/login')
  await signIn(page, 'mechanic@demo.invalid', /\/field$/)
  await expect(page.getByText(one).first()).toBeVisible({ timeout: 60_000 })
  await expect(page.getByText('Not ready for no signal')).toBeHidden({ timeout: 60_000 })

  await test.step('without signal the field betters place, air and machine', async () => {
    await phone.flight(true)
    await page.goto(`/field/jobs/${jobId}`)
    await follow(page, 'Better position')
    await page.getByLabel('Or type it').fill('47.2 N 93.2 W')
    await shot(page, 'set-place')
    await key(page, 'Save position').click()
    await expect(page).toHaveURL(new RegExp(`/field/jobs/${jobId}$`))
    await expect(page.getByText('47.20000', { exact: false }).first()).toBeVisible()
    await page.getByRole('link', { name: /^Air and weather/ }).click()
    await page.getByLabel('Air temperature, °C').fill('many')
    await key(page, 'Save air').click()
    await expect(page.locator('#main').getByText(/a number from −60 to 60/)).toBeVisible()
    await page.getByLabel('Air temperature, °C').fill('-15')
    await page.getByLabel('Weather').fill('Sleet')
    await key(page, 'Save air').click()
    await expect(page.getByText('Air −15 °C. Sleet')).toBeVisible()
    await page.getByRole('link', { name: /^Hours, numbers and year/ }).click()
    await page.getByLabel('Engine hours').fill('421.5')
    await shot(page, 'set-machine')
    await key(page, 'Save machine').click()
    await expect(page).toHaveURL(new RegExp(`/field/jobs/${jobId}$`))
  })

  await test.step('meanwhile the other phone writes another place, later by its clock', async () => {
    other.device.skewMs = 30_000
    await other.send({
      kind: 'job.set',
      jobId,
      entityId: jobId,
      fields: { field: 'place', value: placeAt(47.3, 'By the ford') },
    })
  })

  await test.step('with signal both are shown, and the one that did not stand can be used', async () => {
    await phone.flight(false)
    await expect(page.getByText(/Place also entered: .*47\.2/)).toBeVisible({ timeout: 60_000 })
    await expect(page.getByText('By the ford')).toBeVisible()
    await shot(page, 'also-entered')
    await key(page, /^Use it: Place/).click()
    await expect(page.getByText(/also entered/)).toBeHidden()
    await expect(page.getByText('By the ford')).toBeHidden()
    await expect(page.getByText('stuck', { exact: false })).toBeHidden()
  })

  await test.step('a part line is counted and cancelled', async () => {
    await page.getByRole('link', { name: 'Parts', exact: true }).click()
    await key(page, 'One more: Tow strap').click()
    await expect(page.getByText('Tow strap, 2')).toBeVisible()
    await shot(page, 'parts-asked')
    await key(page, 'Cancel: Tow strap').click()
    await key(page, 'Yes, cancel it').click()
    await expect(page.getByText('Cancelled', { exact: true })).toBeVisible()
  })

  await test.step('the desk merges the two, and the phone lands on the one that goes on', async () => {
    const board = await desk.open('/login')
    await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
    await board.getByRole('link', { name: new RegExp(one) }).click()
    await key(board, 'Merge into …').click()
    const into = await board.getByRole('option', { name: new RegExp(two) }).getAttribute('value')
    await board.getByLabel(/^Merge J-\d+ into$/).selectOption(into)
    await shot(board, 'desk-merge')
    await key(board, 'Merge').click()
    await expect(board).toHaveURL(new RegExp(`/desk/jobs/${intoId}$`))
    await expect(board.getByText(`First look, ${one}`)).toBeVisible()
    await expect(board.getByText(`First look, ${two}`)).toBeVisible()
    await expect(board.getByRole('link', { name: new RegExp(one) })).toBeHidden()
    await shot(board, 'desk-merged')

    await page.goto('/field')
    await expect(page.getByText(two).first()).toBeVisible()
    await expect(page.getByText(one)).toBeHidden({ timeout: 60_000 })
    await page.goto(`/field/jobs/${jobId}/log`)
    await expect(page).toHaveURL(new RegExp(`/field/jobs/${intoId}/log$`))
    await expect(page.getByText(`First look, ${one}`)).toBeVisible()
    await expect(page.getByText(`First look, ${two}`)).toBeVisible()
  })

  await test.step('unmerged, each stands for itself again', async () => {
    const board = desk.page()
    await key(board, /^Unmerge J-\d+$/).click()
    await expect(board.getByText(`First look, ${one}`)).toBeHidden()
    await expect(board.getByRole('link', { name: new RegExp(one) })).toBeVisible()
    await page.goto('/field')
    await expect(page.getByText(one).first()).toBeVisible({ timeout: 60_000 })
  })
})
