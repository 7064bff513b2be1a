import { expect, signIn, test } from '../support/e2e/test'

const ROLES = [
  { who: 'mechanic', home: /\/field$/, sections: ['Jobs', 'Field'], reads: [403, 200, 403] },
  { who: 'guide', home: /\/field$/, sections: null, reads: [403, 403, 403] },
  {
    who: 'dispatcher',
    home: /\/desk$/,
    sections: ['Jobs', 'Parts', 'Take in', 'Field'],
    reads: [200, 200, 200],
  },
  { who: 'parts', home: /\/desk\/parts$/, sections: ['Jobs', 'Parts'], reads: [200, 200, 200] },
  {
    who: 'owner',
    home: /\/desk$/,
    sections: ['Jobs', 'Parts', 'Take in', 'Phones', 'Code book', 'Field'],
    reads: [200, 200, 200],
  },
] as const

for (const { who, home, sections, reads } of ROLES) {
  test(`[R22] the ${who} begins where their work is, sees their sections and reads no more`, async ({
    desk,
  }) => {
    const page = await desk.open('/login')
    await signIn(page, `${who}@demo.invalid`, home)
    await page.goto('/desk')
    if (sections === null) {
      await expect(page).toHaveURL(/\/field$/)
    } else {
      const links = page.getByRole('navigation', { name: 'Desk' }).getByRole('link')
      await expect(links).toHaveText([...sections])
    }
    const statuses = await page.evaluate(() => {
      const paths = ['/api/desk/jobs', '/api/desk/jobs?whose=own', '/api/desk/parts']
      return Promise.all(paths.map(async (path) => (await fetch(path)).status))
    })
    expect(statuses).toEqual([...reads])
  })
}

test('[R22] nobody signed in is sent to sign in, and comes back to where they were going', async ({
  desk,
}) => {
  const page = await desk.open('/desk/parts')
  await expect(page).toHaveURL(/\/login\?to=/)
  await page.getByLabel('E-mail').fill('dispatcher@demo.invalid')
  await page.getByLabel('Password').fill(process.env.DEMO_PASSWORD ?? '')
  await page.getByRole('button', { name: 'Sign in' }).click()
  await expect(page).toHaveURL(/\/desk$/)
  await page.getByRole('button', { name: /Rhee Calder/ }).click()
  await page.getByRole('button', { name: 'Sign out' }).click()
  await expect(page).toHaveURL(/\/login$/)
  await page.goto('/desk')
  await expect(page).toHaveURL(/\/login/)
})

test('[R22] another shop’s person sees their own shop and nothing of the first', async ({
  desk,
}) => {
  const page = await desk.open('/login')
  await signIn(page, 'stranger@demo.invalid', /\/desk$/)
  await expect(page.getByText('Brackenfold Sheds (demo)')).toBeVisible()
  await expect(page.getByText('Quillhook Yard (demo)')).toHaveCount(0)
})

test('[R22] says what is wrong, slows guessing, and keeps no secret', async ({ desk }) => {
  const page = await desk.open('/login')
  const alert = page.getByRole('alert').filter({ hasText: /./ })
  const press = () => page.getByRole('button', { name: 'Sign in' }).click()
  await press()
  await expect(page.getByText('Type your e-mail address.')).toBeVisible()
  await expect(page.getByLabel('E-mail')).toBeFocused()
  await page.getByLabel('E-mail').fill(`nobody-${Date.now()}@demo.invalid`)
  for (let tries = 0; tries < 5; tries++) {
    await page.getByLabel('Password').fill(`not it ${tries}`)
    await press()
    await expect(alert).toHaveText('E-mail or password is not right. Check both and try again.')
    await expect(page.getByLabel('Password')).toHaveValue('')
  }
  await page.getByLabel('Password').fill('not it again')
  await press()
  await expect(alert).toHaveText('Too many wrong tries. Wait 15 minutes, then try again.')
  await desk.flight(true)
  await page.getByLabel('Password').fill('not it either')
  await press()
  await expect(alert).toContainText('No connection to the shop.')
  await desk.flight(false)
  const kept = await page.evaluate(() =>
    JSON.stringify([{ ...localStorage }, { ...sessionStorage }]),
  )
  expect(kept).not.toContain('not it')
  expect(page.url()).not.toContain('not')
})
