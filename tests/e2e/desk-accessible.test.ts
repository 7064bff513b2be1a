import type { Page } from '@playwright/test'
import axe from 'axe-core'
import { makeFieldDevice } from '../support/e2e/field-device'
import { expect, signIn, THEMES, test } from '../support/e2e/test'
import { jobOpen, logAdd, note, partRequestAsk } from '../support/field-ops'

/** Every finding of axe-core in the three themes, as `theme: rule at element`. */
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
  return found
}

test('sign-in, board, job, parts and code book have no finding of axe-core in any theme', async ({
  server,
  desk,
}) => {
  const phone = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const opening = jobOpen('01980000-0000-7000-8000-000000000301', {
    openedAt: phone.device.now(),
    complaint: { words: `Stalls warm ${Date.now()}`, symptom: 'startsThenDies', lampOn: null },
  })
  const jobId = opening.fields.id
  const ask = partRequestAsk(jobId, { askedAt: phone.device.now() })
  await phone.send(opening, logAdd(phone.device, jobId, note('Stalls when warm')), ask)

  const page = await desk.open('/login')
  expect(await findings(page)).toEqual([])
  await signIn(page, 'owner@demo.invalid', /\/desk$/)
  await expect(page.getByRole('heading', { name: 'Open jobs' })).toBeVisible()
  await page.goto(`/desk/jobs/${jobId}`)
  const suspect = page.getByRole('button', { name: /Ignition coil/ }).first()
  await suspect.click()
  await page
    .getByRole('button', { name: /^Work on/ })
    .first()
    .click()
  await page.getByRole('button', { name: /Ida Thornwick/ }).click()
  expect(await findings(page)).toEqual([])
  await page.goto('/desk/parts')
  await page
    .getByRole('button', { name: /^Work on/ })
    .first()
    .click()
  expect(await findings(page)).toEqual([])
  await page.goto('/desk/codebook')
  await expect(page.getByRole('heading', { level: 1, name: 'Code book' })).toBeVisible()
  expect(await findings(page)).toEqual([])
})

test('the desk holds at 320 px and at double text size: nothing runs off the side', async ({
  desk,
}) => {
  const page = await desk.open('/login')
  await signIn(page, 'owner@demo.invalid', /\/desk$/)
  for (const path of [
    '/desk',
    '/desk/parts',
    '/desk/import',
    '/desk/phones',
    '/desk/codebook',
    '/login',
  ]) {
    for (const [width, text] of [
      [320, '100%'],
      [640, '200%'],
    ] as const) {
      await page.setViewportSize({ width, height: 800 })
      await page.goto(path)
      await page.evaluate((size) => {
        document.documentElement.style.fontSize = size
      }, text)
      await expect(page.getByRole('main')).toBeVisible()
      const over = await page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      )
      expect([path, width, text, over]).toEqual([path, width, text, 0])
    }
  }
})
