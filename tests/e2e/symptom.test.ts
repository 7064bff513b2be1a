import { follow, press } from '../support/e2e/main-job'
import { expect, signIn, test } from '../support/e2e/test'

test('[F1] [F5] a job opened in the rider’s words alone is told later what the machine does', async ({
  phone,
  desk,
  shot,
}) => {
  test.setTimeout(180_000)
  const words = `Went quiet at the creek ${Date.now() % 100_000}`
  const page = await phone.open('/login')
  await signIn(page, 'mechanic@demo.invalid', /\/field$/)
  await expect(page.getByText(/Code book version \d/)).toBeVisible({ timeout: 60_000 })
  await expect(page.getByText('Not ready for no signal')).toBeHidden({ timeout: 60_000 })
  await phone.flight(true)

  await follow(page, /New job|Go on with new job/)
  await press(page, 'All well, go on')
  await page.getByRole('radio', { name: /14/ }).check({ force: true })
  await press(page, 'Go on')
  await page.getByLabel('In the rider’s own words').fill(words)
  await press(page, 'Go on')
  await press(page, /Open (the )?job/)
  await follow(page, 'Checks')
  await expect(page.getByRole('heading', { name: 'No symptom yet' })).toBeVisible()
  await shot(page, 'no-symptom')

  await follow(page, 'What does it do?')
  await press(page, 'Save symptom')
  await expect(page.getByText('Pick what it does first.')).toBeVisible()
  await page.getByLabel('Search as the rider says it').fill('dies')
  await page.getByRole('radio', { name: /Starts, then dies/i }).check({ force: true })
  await shot(page, 'symptom')
  await press(page, 'Save symptom')
  await expect(page.locator('[data-row]').first()).toBeVisible()
  const address = page.url().replace('/checks', '')

  await phone.flight(false)
  const board = await desk.open('/login')
  await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
  await board.goto(address.replace('/field/', '/desk/'))
  await expect(board.getByText('Nobody has said yet what it does')).toBeHidden()
  await expect(board.locator('[data-row]').first()).toBeVisible()
})
