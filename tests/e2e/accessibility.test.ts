import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import type { Page } from '@playwright/test'
import { expect, signIn, THEMES, test } from '../support/e2e/test'

/** Pages without a job, in the three themes, against the rules of axe (WCAG 2.2 A and AA). */
const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')

type Found = { id: string; nodes: { target: string[] }[] }

async function violations(page: Page): Promise<string[]> {
  await page.evaluate(axe)
  const found = await page.evaluate(async () => {
    const tool = (window as unknown as { axe: { run(): Promise<{ violations: Found[] }> } }).axe
    return (await tool.run()).violations
  })
  return found.map(
    (one) => `${one.id}: ${one.nodes.map((node) => node.target.join(' ')).join(', ')}`,
  )
}

async function expectClean(page: Page): Promise<void> {
  for (const theme of THEMES) {
    await page.evaluate((value) => {
      document.documentElement.dataset.theme = value
    }, theme)
    expect(await violations(page), `${page.url()} ${theme}`).toEqual([])
  }
}

test('the field is clean for assistive tools', async ({ phone }) => {
  const page = await phone.open('/login')
  await expectClean(page)
  await signIn(page, 'mechanic@demo.invalid', /\/field$/)
  await expect(page.getByText(/Code book version \d/)).toBeVisible({ timeout: 60_000 })
  for (const path of ['/field', '/field/new', '/field/unsent', '/field/about']) {
    await phone.open(path)
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
    await expectClean(page)
  }
})

test('the desk is clean for assistive tools', async ({ desk }) => {
  const page = await desk.open('/login')
  await signIn(page, 'owner@demo.invalid', /\/desk$/)
  for (const path of ['/desk', '/desk/parts']) {
    await desk.open(path)
    await expect(page.getByRole('heading').first()).toBeVisible()
    await expectClean(page)
  }
})

test('a screen that had to be fetched has the focus on its title', async ({ phone }) => {
  const page = await phone.open('/login')
  await signIn(page, 'mechanic@demo.invalid', /\/field$/)
  await expect(page.getByText(/Code book version \d/)).toBeVisible({ timeout: 60_000 })
  const titled = (name: string) => page.getByRole('heading', { level: 1, name, exact: true })
  await page.getByRole('link', { name: 'What this phone holds' }).click()
  await expect(titled('This phone')).toBeFocused()
  await page.goBack()
  await expect(titled('Jobs')).toBeFocused()
  await page.getByRole('link', { name: 'New job' }).click()
  await expect(page).toHaveURL(/\/field\/new$/)
  await expect(page.getByRole('heading', { level: 1 })).toBeFocused()
  await phone.open('/field/jobs/01980000-0000-7000-8000-00000000dead/checks')
  await expect(titled('Not on this phone')).toBeVisible()
})
