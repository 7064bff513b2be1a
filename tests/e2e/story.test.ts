import type { LogBody } from '@/lib/model/log-entry'
import {
  ABOVE_90,
  chanceIn,
  DONE,
  draftKept,
  FITNESS,
  follow,
  press,
} from '../support/e2e/main-job'
import { reckoned, titleOf } from '../support/e2e/reckoned'
import { expect, signIn, test } from '../support/e2e/test'

// The main job. Figures: worked case of the readings (JCGM 100, 106), Clopper-Pearson, expected cost.
test('the main job, from flight mode to the desk', async ({
  server,
  phone,
  desk,
  partsDesk,
  shot,
}) => {
  test.setTimeout(600_000)
  await test.step('signed in once with signal, the phone holds all it needs', async () => {
    const page = await phone.open('/login')
    await signIn(page, 'mechanic@demo.invalid', /\/field$/)
    await expect(page.getByText(/Code book version \d/)).toBeVisible({ timeout: 60_000 })
    await expect(page.getByText('Not ready for no signal')).toBeHidden({ timeout: 60_000 })
    await shot(page, 'field-jobs')
    await phone.close()
  })

  const board = await desk.open('/login')
  await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
  const counter = await partsDesk.open('/login')
  await signIn(counter, 'parts@demo.invalid', /\/desk/)
  await counter.goto('/desk/parts')
  await expect(counter.getByRole('heading', { name: /parts/i }).first()).toBeVisible()
  const complaint = `Dies after two seconds ${Date.now() % 100_000}`

  const told = { words: complaint, symptom: 'startsThenDies', lampOn: true }
  const symptom: LogBody = {
    kind: 'symptom',
    symptom: told.symptom,
    conditions: [],
    words: complaint,
  }
  const code: LogBody = {
    kind: 'code',
    seen: { format: 'spn', spn: 1268, fmi: 3 },
    context: { module: 0, status: 'active', count: null, order: 1, photo: null },
  }

  await server.stop()
  await phone.flight(true)

  await test.step('1 new job from a cold start in flight mode', async () => {
    const page = await phone.open('/field')
    await follow(page, 'New job')
    await shot(page, 'intake-people')
    await press(page, 'All well, go on')
    await page.getByRole('radio', { name: /14/ }).check({ force: true })
    await shot(page, 'intake-machine')
    await press(page, 'Go on')
    await page.getByLabel('In the rider’s own words').fill(complaint)
    await page.getByRole('radio', { name: /Starts, then dies/i }).check({ force: true })
    await page.getByRole('radio', { name: 'On', exact: true }).check({ force: true })
    await page.getByRole('checkbox', { name: /Recent work/ }).check({ force: true })
    await shot(page, 'intake-complaint')
    await press(page, 'Go on')
    await press(page, 'Take my position')
    await expect(page.getByText(/Position fix, good to/)).toBeVisible()
    await shot(page, 'intake-place')
    await press(page, 'Open the job')
    await expect(page).toHaveURL(/\/field\/jobs\/[0-9a-f-]{36}$/)
    await expect(page.getByText('Codes taken down')).toBeVisible()
    await shot(page, 'job')
  })
  const jobPath = new URL(phone.page().url()).pathname

  await test.step('2 the code as the dash shows it', async () => {
    const page = await phone.open(`${jobPath}/codes`)
    await expect(page.getByText('How to show them on this model')).toBeVisible()
    await shot(page, 'codes-empty')
    // Nothing is on record yet, so clearing is refused (R11).
    await expect(page.getByText(/^Refused until the codes are taken down/)).toBeVisible()
    await expect(page.getByRole('button', { name: 'Codes are cleared' })).toHaveCount(0)
    await page.getByRole('radio', { name: /Numbers: SPN and FMI/ }).check({ force: true })
    await page.getByLabel('Module').fill('0')
    await page.getByLabel('SPN', { exact: true }).fill('1268')
    await page.getByLabel('FMI', { exact: true }).fill('3')
    await page.getByRole('radio', { name: 'Active' }).check({ force: true })
    await press(page, 'Take it down')
    await expect(page.getByText(/ignition coil 1/i).first()).toBeVisible()
    await expect(page.getByText(/voltage above normal/i).first()).toBeVisible()
    await expect(page.getByText('The third number is the failure kind')).toBeVisible()
    await expect(page.getByText(/names a circuit, not a part/)).toBeVisible()
    await expect(page.getByText(/^Refused until/)).toHaveCount(0)
    await expect(page.getByText('It supports')).toBeVisible()
    await expect(page.getByText('It argues against')).toBeVisible()
    await shot(page, 'codes-meaning')
  })

  await test.step('3 suspects rank by inference and say why', async () => {
    const page = await phone.open(`${jobPath}/checks`)
    await expect(page.getByText('Suspects, of 100')).toBeVisible()
    for (const name of [
      'Ignition coil',
      'Coil connector and wiring',
      'Coil driver',
      'Something else',
    ])
      await expect(page.getByText(name, { exact: false }).first()).toBeVisible()
    // The page's engine, on the book that the phone fetched, against the engine here on the repository's.
    const { order, shown } = reckoned('14', told, [symptom, code])
    const rows = page.locator('[data-row]')
    for (const [at, fault] of order.slice(0, 5).entries()) {
      await expect(rows.nth(at)).toHaveAttribute('data-row', fault)
      await expect(chanceIn(page, fault)).toHaveText(shown(fault))
    }
    await shot(page, 'checks')
  })

  await test.step('4 before the check: this meter cannot decide this spec', async () => {
    const page = await phone.open(`${jobPath}/checks/coilPrimaryResistance`)
    const fitness = page.getByRole('region', { name: 'This meter cannot decide it' })
    for (const words of FITNESS) await expect(fitness.getByText(words)).toBeVisible()
    await expect(fitness.getByRole('link', { name: 'Swap the ignition coil' })).toBeVisible()
    await shot(page, 'check')
    await phone.open(`${jobPath}/checks/coilPrimaryResistance/reading`)
    await press(page, /^Meter set-up/)
    await press(page, /both at about 20/)
    await press(page, /^(Close|Meter) set-up/)
    await press(page, '1')
    await press(page, '.')
    await expect(page.getByRole('status', { name: 'Figure' })).toContainText('1.')
    await draftKept(page)
  })

  await test.step('the phone dies in the middle of typing: "1." is still in the keypad', async () => {
    await phone.kill()
    const page = await phone.open(`${jobPath}/checks/coilPrimaryResistance/reading`)
    await expect(page.getByRole('status', { name: 'Figure' })).toContainText('1.')
    await press(page, '0')
    await expect(page.getByText('Too close to call').first()).toBeVisible()
    await shot(page, 'reading')
    await press(page, 'Save')
    await expect(page.getByText(/Best estimate 0\.55/)).toBeVisible()
    await expect(
      page.getByText(/Chance of being within the spec: 19 of 100 \(16 by the exact sum\)/),
    ).toBeVisible()
    await expect(page.getByText('The suspects barely move.')).toBeVisible()
    await press(page, 'Show the sums')
    await expect(page.getByText('0.198')).toBeVisible()
    await shot(page, 'reading-saved')
    await press(page, 'Measure a known-good part too')
    for (const key of ['1', '.', '0', 'Save']) await press(page, key)
    await expect(page.getByText(/this check says nothing about the part/)).toBeVisible()
  })

  await test.step('5 swap with the spare, back, and new', async () => {
    const page = await phone.open(`${jobPath}/swap/coilSwap`)
    await shot(page, 'swap')
    await press(page, 'Gone')
    await expect(page.getByText('2. Refit the old ignition coil')).toBeVisible()
    await page.getByRole('button', { name: 'Back', exact: true }).last().click()
    await expect(page.getByText('3. Fit the new ignition coil')).toBeVisible()
    await press(page, 'Gone')
    await expect(page.getByRole('link', { name: 'Record the fix' })).toBeVisible()
    await shot(page, 'swap-done')
    await phone.open(`${jobPath}/checks`)
    await expect(chanceIn(page, 'ignitionCoilPart')).toHaveText(ABOVE_90)
  })

  await test.step('6 fix, codes cleared, proof run', async () => {
    const page = await phone.open(`${jobPath}/fix?fault=ignitionCoilPart`)
    await page.getByLabel('What you did').fill('New coil fitted, connector seated.')
    await press(page, 'Record the fix')
    await shot(page, 'fix')
    await page.getByRole('button', { name: 'Codes are cleared' }).press('Enter')
    await press(page, 'Yes, cleared')
    await press(page, 'None back')
    await expect(page.getByText(/none came back/)).toBeVisible()
    await phone.open(`${jobPath}/proof`)
    for (let starts = 0; starts < 5; starts++) await press(page, 'Clean start')
    await draftKept(page)
    await phone.kill()
    const again = await phone.open(`${jobPath}/proof`)
    for (let starts = 0; starts < 7; starts++) await press(again, 'Clean start')
    await press(again, 'Type the minutes instead')
    await again.getByLabel('Minutes, typed').fill('10')
    await again.getByRole('radio', { name: /Hot/ }).check({ force: true })
    await expect(
      again.getByText(
        /12 clean restarts: up to 22 of 100 starts could still fail \(one-sided 95 %\)\. The 3\/n rule says 25\./,
      ),
    ).toBeVisible()
    await shot(again, 'proof')
    await press(again, 'Save the proof run')
    await expect(again.getByText('Proof run saved')).toBeVisible()
  })

  await test.step('7 the part and the advice', async () => {
    const page = await phone.open(`${jobPath}/parts`)
    await page
      .getByRole('link', { name: /Ignition coil/ })
      .first()
      .click()
    await expect(page.getByText('135.00').first()).toBeVisible()
    await expect(page.getByText('25.00').first()).toBeVisible()
    await expect(page.getByText('300.00').first()).toBeVisible()
    await expect(
      page.getByText('Break-even: the aftermarket part pays until 38.7 of 100 fail.'),
    ).toBeVisible()
    await expect(
      page.getByText(
        'Expected cost with one recovery in it: genuine 141.00 USD, aftermarket 61.00 USD.',
      ),
    ).toBeVisible()
    await expect(page.getByText('By expected cost: fit the aftermarket part.')).toBeVisible()
    await shot(page, 'part-ask')
    await press(page, 'Ask for it')
    await expect(page.getByText(/Ignition coil, 1/)).toBeVisible()
  })

  await test.step('8 way out, note, one photo', async () => {
    const page = await phone.open(`${jobPath}/wayout`)
    await page.getByRole('radio', { name: /Repair here/ }).check({ force: true })
    await page.getByLabel('Reasons').fill('Swapped back and confirmed; 12 clean restarts.')
    await shot(page, 'way-out')
    await press(page, 'Record the way out')
    await expect(page.getByText('Decided')).toBeVisible()
    await phone.open(`${jobPath}/note`)
    await page.getByLabel('What is it?').fill('Old coil goes back to the shop.')
    await press(page, 'Save note')
    await expect(page).toHaveURL(/\/log$/)
    await phone.open(`${jobPath}/photo`)
    await page.locator('input[type=file]').setInputFiles({
      name: 'coil.png',
      mimeType: 'image/png',
      buffer: await page.screenshot(),
    })
    await expect(page.getByRole('button', { name: 'Save photo' })).toBeVisible()
    await page.getByLabel('Caption').fill('Old coil')
    await press(page, 'Save photo')
    await expect(page).toHaveURL(/\/log$/)
    await expect(page.getByText('Below: this phone only', { exact: false })).toBeVisible()
    await shot(page, 'log')
    await phone.open('/field/unsent')
    await expect(page.getByRole('button', { name: 'Try sending now' })).toBeVisible()
    await shot(page, 'unsent')
  })

  await test.step('9 signal returns: all goes up once, the desk shows it without a reload', async () => {
    await server.start()
    await phone.flight(false)
    const page = await phone.open(jobPath)
    await expect(page.getByRole('link', { name: 'All sent' })).toBeVisible({ timeout: 60_000 })
    await shot(page, 'job-sent')
    await expect(board.getByText(complaint).first()).toBeVisible({ timeout: 40_000 })
    await board.getByText(complaint).first().click()
    await expect(board.getByText('Old coil goes back to the shop.')).toBeVisible()
    await expect(board.getByText('12 starts, 10 min without the fault')).toBeVisible()
    const jobId = jobPath.slice(jobPath.lastIndexOf('/') + 1)
    const answer = await desk.context().request.get(`/api/desk/jobs/${jobId}`)
    const { entries, photos } = (await answer.json()) as {
      entries: { id: string; order: number; receivedAt: string; body: LogBody }[]
      photos: { hash: string; receivedAt: string }[]
    }
    // Everything once, in the order of doing, and every line on the board.
    expect(entries.map(({ body }) => (body.kind === 'swap' ? body.step : body.kind))).toEqual(DONE)
    expect(new Set(entries.map(({ id }) => id)).size).toBe(DONE.length)
    const lines = board.locator('.desk-log > li')
    await expect(lines).toHaveCount(DONE.length)
    for (const [at, { body }] of entries.entries())
      await expect(lines.nth(at)).toContainText(titleOf(body))
    // The photo's bytes came after all records.
    expect(photos).toHaveLength(1)
    const records = entries.map(({ receivedAt }) => Date.parse(receivedAt))
    expect(Date.parse(photos[0]?.receivedAt ?? '')).toBeGreaterThan(Math.max(...records))
    const photo = await desk.context().request.get(`/api/photos/${photos[0]?.hash}`)
    expect(photo.headers()['content-type']).toBe('image/jpeg')
    const small = board.getByRole('img', { name: 'Old coil' })
    await small.scrollIntoViewIfNeeded()
    await expect.poll(() => small.evaluate((img: HTMLImageElement) => img.naturalHeight)).toBe(320)
    await small.click()
    await expect
      .poll(() => small.evaluate((img: HTMLImageElement) => img.naturalHeight))
      .toBeGreaterThan(800)
    await phone.open(`${jobPath}/checks`)
    const bodies = entries.map(({ body }) => body)
    const { shown } = reckoned('14', told, bodies)
    const chance = shown('ignitionCoilPart')
    expect(chance).toMatch(ABOVE_90)
    await expect(chanceIn(phone.page(), 'ignitionCoilPart')).toHaveText(chance)
    await expect(chanceIn(board, 'ignitionCoilPart')).toHaveText(chance)
    await shot(board, 'desk-board')
    await expect(counter.getByText('Ignition coil').first()).toBeVisible({ timeout: 40_000 })
    await shot(counter, 'desk-parts')
  })
})
