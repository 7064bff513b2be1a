import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { test as base, expect, type Page } from '@playwright/test'
import { makePhone, type Phone } from './phone'
import { makeServer, type TestServer } from './server'

const PHONE = { width: 390, height: 844 }
const DESK = { width: 1280, height: 800 }

type Fixtures = {
  phone: Phone
  desk: Phone
  partsDesk: Phone
  shot(page: Page, name: string): Promise<void>
}

/** Signs in by the form and waits for the page that the role begins at. */
export async function signIn(page: Page, email: string, home: RegExp): Promise<void> {
  await page.goto('/login')
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password').fill(process.env.DEMO_PASSWORD ?? '')
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(home)
}

export const THEMES = ['day', 'shade', 'night'] as const

/** Playwright's test with a running product, a phone and two desks, each with a profile of its own. */
export const test = base.extend<Fixtures, { server: TestServer }>({
  server: [
    // biome-ignore lint/correctness/noEmptyPattern: Playwright reads the pattern
    async ({}, use) => {
      const server = await makeServer()
      await server.start()
      await use(server)
      await server.close()
    },
    { scope: 'worker' },
  ],
  phone: async ({ server }, use, info) => {
    const phone = makePhone(info.outputPath('phone'), server.base, PHONE)
    await use(phone)
    await phone.close()
  },
  desk: async ({ server }, use, info) => {
    const desk = makePhone(info.outputPath('desk'), server.base, DESK)
    await use(desk)
    await desk.close()
  },
  partsDesk: async ({ server }, use, info) => {
    const desk = makePhone(info.outputPath('parts'), server.base, DESK)
    await use(desk)
    await desk.close()
  },
  // biome-ignore lint/correctness/noEmptyPattern: Playwright reads the pattern
  shot: async ({}, use) => {
    const folder = join(process.cwd(), '.data', 'screens')
    mkdirSync(folder, { recursive: true })
    await use(async (page, name) => {
      for (const theme of THEMES) {
        await page.evaluate((value) => {
          document.documentElement.dataset.theme = value
        }, theme)
        await page.screenshot({ path: join(folder, `${name}-${theme}.png`) })
      }
      await page.evaluate(() => {
        document.documentElement.dataset.theme = 'day'
      })
    })
  },
})

export { expect }
