import { expect, signIn, test } from '../support/e2e/test'

/** Sign-in of each role, where it begins, and what the server refuses each (F13, P11). */
const BEGINS = [
  { email: 'mechanic@demo.invalid', home: /\/field$/ },
  { email: 'guide@demo.invalid', home: /\/field$/ },
  { email: 'dispatcher@demo.invalid', home: /\/desk$/ },
  { email: 'parts@demo.invalid', home: /\/desk/ },
  { email: 'owner@demo.invalid', home: /\/desk$/ },
]

for (const { email, home } of BEGINS)
  test(`${email} signs in, is known to the server, and signs out for good`, async ({
    desk,
    server,
  }) => {
    const page = await desk.open('/login')
    await signIn(page, email, home)
    const me = await desk.context().request.get('/api/me')
    expect(me.status()).toBe(200)
    const cookies = await desk.context().cookies()
    const copied = cookies.map((one) => `${one.name}=${one.value}`).join('; ')
    const csrf = (await (await desk.context().request.get('/api/auth/csrf')).json()) as {
      csrfToken: string
    }
    await desk.context().request.post('/api/auth/signout', {
      form: { csrfToken: csrf.csrfToken, json: 'true', callbackUrl: '/' },
    })
    const after = await fetch(`${server.base}/api/me`, { headers: { cookie: copied } })
    expect(after.status).toBe(401)
  })

test('a wrong password gets one sentence and no session', async ({ desk }) => {
  const page = await desk.open('/login')
  await page.getByLabel('E-mail').fill('owner@demo.invalid')
  await page.getByLabel('Password').fill('not this one')
  await page.getByRole('button', { name: 'Sign in' }).click()
  await expect(page.getByRole('alert').filter({ hasText: /\S/ }).first()).toBeVisible()
  expect((await desk.context().request.get('/api/me')).status()).toBe(401)
})

/** The job of the other shop (scripts/demo-shop.ts), and one that is nowhere. */
const FOREIGN_JOB = '01980000-0000-7000-8000-000000000651'
const NO_JOB = '01980000-0000-7000-8000-00000000ffff'

test('nobody, a guide, a mechanic and a stranger are refused what is not theirs', async ({
  desk,
  server,
}) => {
  for (const path of [
    '/api/desk/jobs',
    '/api/desk/parts',
    '/api/codebook',
    '/api/events',
    '/api/me',
  ])
    expect((await fetch(`${server.base}${path}`)).status, path).toBe(401)
  const page = await desk.open('/login')
  const ask = desk.context().request
  const enter = async (email: string, home: RegExp) => {
    await desk.context().clearCookies()
    await page.goto('/login')
    await signIn(page, email, home)
  }
  const status = async (path: string) => (await ask.get(path)).status()

  await signIn(page, 'guide@demo.invalid', /\/field$/)
  expect(await status('/api/desk/jobs')).toBe(403)
  expect(await status('/api/desk/parts')).toBe(403)

  await enter('mechanic@demo.invalid', /\/field$/)
  expect(await status('/api/desk/jobs?whose=all')).toBe(403)
  expect(await status(`/api/desk/jobs/${FOREIGN_JOB}`)).toBe(404)

  // The other shop's own job: there for its people, nowhere for anybody else, told alike.
  await enter('stranger@demo.invalid', /\/desk$/)
  expect(await status(`/api/desk/jobs/${FOREIGN_JOB}`)).toBe(200)
  await enter('dispatcher@demo.invalid', /\/desk$/)
  const foreign = await ask.get(`/api/desk/jobs/${FOREIGN_JOB}`)
  const nowhere = await ask.get(`/api/desk/jobs/${NO_JOB}`)
  expect([foreign.status(), nowhere.status()]).toEqual([404, 404])
  expect(await foreign.text()).toBe(await nowhere.text())
})

test('documents carry the policies of a document, answers of the API only what they need', async ({
  server,
}) => {
  const headersOf = async (path: string) => (await fetch(`${server.base}${path}`)).headers
  for (const path of ['/login', '/field', '/field/unsent', '/sw.js']) {
    const headers = await headersOf(path)
    expect(headers.get('x-content-type-options')).toBe('nosniff')
    expect(headers.get('referrer-policy')).toBe('same-origin')
    expect(headers.get('cross-origin-opener-policy')).toBe('same-origin')
    expect(headers.get('permissions-policy')).toContain('camera=(self)')
  }
  const headers = await headersOf('/api/me')
  expect(headers.get('x-content-type-options')).toBe('nosniff')
  expect(headers.get('permissions-policy')).toBeNull()
})
