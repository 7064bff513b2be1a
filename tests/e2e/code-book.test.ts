import type { Page } from '@playwright/test'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { bookNotices } from '@/lib/sync/protocol/book'
import { OTHER_JOB } from '@/scripts/demo-shop'
import { press } from '../support/e2e/main-job'
import { expect, signIn, test } from '../support/e2e/test'

const symptom = BOOK_ITEMS.find((item) => item.kind === 'symptom' && item.id === 'startsThenDies')
const lookId = symptom?.kind === 'symptom' ? symptom.firstLook[0] : undefined
const look = BOOK_ITEMS.find((item) => item.kind === 'check' && item.id === lookId)
if (look?.kind !== 'check') throw new Error('the complaint has no first look')
const worst = look.outcomes.at(-1)?.name ?? ''

const jobPath = `/field/jobs/${OTHER_JOB.id}`
const OWNER = 'stranger@demo.invalid'

/** The version that the field says it holds. */
async function versionOn(page: Page): Promise<number> {
  const text = await page.getByText(/Code book version \d+\./).textContent()
  return Number(/version (\d+)/.exec(text ?? '')?.[1])
}

// In the shop that no other test works in, as its owner: at the desk and in the field.
test('[F11] [R23] a new book is published and taken, a check is withdrawn and acknowledged', async ({
  phone,
  desk,
  shot,
}) => {
  test.setTimeout(300_000)
  const page = await phone.open('/login')
  await signIn(page, OWNER, /\/desk$/)
  await page.goto('/field')
  await expect(page.getByText(/Code book version \d/)).toBeVisible({ timeout: 60_000 })
  await expect(page.getByText('Not ready for no signal')).toBeHidden({ timeout: 60_000 })
  const first = await versionOn(page)

  await test.step('a job is begun with the version the phone holds', async () => {
    await page.goto(`${jobPath}/symptom`)
    await page.getByLabel('Search as the rider says it').fill('dies')
    await page.getByRole('radio', { name: /Starts, then dies/i }).check({ force: true })
    await press(page, 'Save symptom')
    await expect(page.locator('[data-row]').first()).toBeVisible()
    await page.goto(`${jobPath}/checks/${look.id}`)
    await press(page, worst)
    await expect(page.getByText(worst).first()).toBeVisible()
    await expect(page.getByRole('link', { name: 'All sent' })).toBeVisible({ timeout: 60_000 })
  })

  const board = await desk.open('/login')
  await signIn(board, OWNER, /\/desk$/)
  await test.step('the owner takes a changed book in as a file and publishes it', async () => {
    await board.goto('/desk/codebook')
    await expect(board.getByRole('region', { name: `Version ${first}` })).toBeVisible()
    const exported = await desk.context().request.get('/api/desk/codebook/export')
    const book = (await exported.json()) as {
      items: { kind: string; id: string; minutes?: number }[]
    }
    const items = book.items.map((item) =>
      item.id === look.id ? { ...item, minutes: look.minutes + 0.5 } : item,
    )
    await board.locator('input[type=file]').setInputFiles({
      name: 'book.json',
      mimeType: 'application/json',
      buffer: Buffer.from(JSON.stringify({ ...book, items })),
    })
    await expect(board.getByText('Nothing hinders its publishing.').first()).toBeVisible({
      timeout: 60_000,
    })
    await shot(board, 'desk-code-book-draft')
    await press(board, 'Publish the draft')
    const next = board.getByRole('region', { name: `Version ${first + 1}`, exact: true })
    await expect(next).toBeVisible({ timeout: 60_000 })
    await expect(next.getByText(`check ${look.id}`)).toBeVisible()
  })

  await test.step('the phone takes it, and the job keeps its own until it is moved', async () => {
    await page.goto('/field')
    await expect(page.getByText(`Code book version ${first + 1}.`)).toBeVisible({ timeout: 60_000 })
    await page.goto('/field/about')
    await expect(page.getByText('Held for open jobs')).toBeVisible()
    await page.goto(jobPath)
    const words = `This job began with version ${first} and keeps it.`
    await expect(page.getByText(words)).toBeVisible()
    await expect(page.getByText(`Checks: changed ${look.name}.`)).toBeVisible()
    await shot(page, 'job-code-book')
    await press(page, 'Use the new code book')
    await expect(page.getByText(words)).toBeHidden()
    await page.goto(`${jobPath}/log`)
    await expect(page.getByText(`Code book version ${first + 1} from here on.`)).toBeVisible()
    await expect(page.getByRole('link', { name: 'All sent' })).toBeVisible({ timeout: 60_000 })
  })

  await test.step('the owner withdraws the check', async () => {
    await press(board, 'Withdraw something for safety')
    await board.getByRole('textbox', { name: 'Which check' }).fill(look.id)
    await board.getByRole('radio', { name: look.name }).check()
    await board.getByLabel('Why, in one sentence').fill('The part may be hot.')
    await board.getByLabel('What to do instead').fill('Wait ten minutes first.')
    await shot(board, 'desk-withdraw')
    await board.getByRole('button', { name: 'Withdraw it' }).press('Enter')
    await board.getByRole('button', { name: 'Withdraw it' }).last().click()
    await expect(board.getByText('Nobody has acknowledged it yet.')).toBeVisible()
    await press(board, 'Jobs it changes')
    const jobs = board.getByRole('list', { name: 'Jobs it changes' })
    await expect(jobs.getByText('Will not start at the shed')).toBeVisible()
    await shot(board, 'desk-code-book')
  })

  const notice = page.getByRole('alert', { name: 'Withdrawn from the code book' })
  await test.step('the phone is told at its next contact, and it is offered no more', async () => {
    await page.goto(jobPath)
    await expect(notice).toBeVisible({ timeout: 60_000 })
    await expect(notice.getByText('Instead: Wait ten minutes first.')).toBeVisible()
    await expect(notice.getByText(/Was: .* of 100\. Now: .* of 100\./)).toBeVisible()
    await shot(page, 'withdrawal')
  })

  await test.step('it is acknowledged without signal, and the shop hears of it later', async () => {
    await phone.flight(true)
    const cold = await phone.open(`${jobPath}/checks/${look.id}`)
    await expect(cold.getByText(`has no check called “${look.id}”`)).toBeVisible()
    await press(cold, 'I have read it')
    await expect(notice).toBeHidden()
    await expect(cold.getByRole('link', { name: /1 not sent|1 .*unsent/i })).toBeVisible()
    await phone.kill()
    const again = await phone.open('/field')
    await expect(again.getByText('1 not sent.').first()).toBeVisible()
    await expect(again.getByRole('alert', { name: 'Withdrawn from the code book' })).toBeHidden()
    await phone.flight(false)
    await expect(again.getByRole('link', { name: 'All sent' })).toBeVisible({ timeout: 60_000 })
    await expect(board.getByText(/^Acknowledged by: Wren Holloway/)).toBeVisible({
      timeout: 40_000,
    })
    const told = await desk.context().request.get('/api/codebook?as=notices')
    expect(bookNotices.parse(await told.json()).withdrawals.at(-1)?.heard).toHaveLength(1)
  })

  await test.step('the list of phones says which version it holds', async () => {
    await board.goto('/desk/phones')
    await expect(board.getByText(`Version ${first + 1}`).first()).toBeVisible()
  })
})
