import type { Page } from '@playwright/test'
import { hashOf, makeFieldDevice } from '../support/e2e/field-device'
import { expect, signIn, test } from '../support/e2e/test'
import { jobOpen, logAdd } from '../support/field-ops'
import { webmOf } from '../support/voices'

/** Unit 14 of the demo fleet. */
const UNIT_14 = '01980000-0000-7000-8000-000000000301'
const key = (page: Page, name: string) => page.getByRole('button', { name, exact: true })

test('[R8] [PH5] a voice note, from flight mode to the desk', async ({
  server,
  phone,
  desk,
  shot,
}) => {
  test.setTimeout(240_000)
  const other = await makeFieldDevice(server.base, 'mechanic@demo.invalid')
  const words = `Rattles when hot ${Date.now() % 100_000}`
  const opening = jobOpen(UNIT_14, {
    openedAt: other.device.now(),
    complaint: { words, symptom: 'startsThenDies', lampOn: true },
  })
  await other.send(opening)
  const path = `/field/jobs/${opening.fields.id}`

  const board = await desk.open('/login')
  await signIn(board, 'dispatcher@demo.invalid', /\/desk$/)
  await board.getByRole('link', { name: new RegExp(words, 'i') }).click()

  await test.step('the phone holds the job, then loses all signal', async () => {
    const page = await phone.open('/login')
    await signIn(page, 'mechanic@demo.invalid', /\/field$/)
    await expect(page.getByText(words).first()).toBeVisible({ timeout: 60_000 })
    await expect(page.getByText('Not ready for no signal')).toBeHidden({ timeout: 60_000 })
    await server.stop()
    await phone.flight(true)
  })

  await test.step('a microphone that is refused is one clear sentence', async () => {
    const page = await phone.open(`${path}/log`)
    await page.getByRole('link', { name: 'Voice note' }).click()
    await key(page, 'Record').click()
    await expect(page.getByText(/The microphone is not allowed for this app/)).toBeVisible()
    await shot(page, 'voice-refused')
  })

  await test.step('recorded, thrown away, recorded again, listened to and saved', async () => {
    const page = phone.page()
    await phone.context().grantPermissions(['geolocation', 'microphone'])
    await key(page, 'Record').click()
    await expect(page.getByRole('timer')).toContainText(/0:0[1-9]/)
    await shot(page, 'voice-recording')
    await key(page, 'Stop').click()
    await key(page, 'Throw away').click()
    await key(page, 'Yes, throw away').click()
    await key(page, 'Record').click()
    await expect(page.getByRole('timer')).toContainText(/0:0[2-9]/)
    await key(page, 'Stop').click()
    await key(page, 'Listen').click()
    await expect(page.getByText(/0:0[1-9] of\/ 0:0/)).toBeVisible()
    await page.getByLabel('Caption').fill('The rattle, engine hot')
    await shot(page, 'voice-taken')
    await key(page, 'Save voice note').click()
    await expect(page).toHaveURL(/\/log$/)
    await expect(page.getByText('Below: this phone only', { exact: false })).toBeVisible()
  })

  await test.step('it outlives a dead phone and is listed as unsent', async () => {
    await phone.kill()
    const page = await phone.open('/field/unsent')
    await expect(page.getByText('Voice note', { exact: true })).toHaveCount(2)
    await phone.open(`${path}/log`)
    await page.getByText('The rattle, engine hot').click()
    await key(page, 'Listen').click()
    await expect(key(page, 'Stop')).toBeVisible()
    await shot(page, 'voice-entry')
  })

  await test.step('with signal it reaches the desk and plays there', async () => {
    await server.start()
    await phone.flight(false)
    const page = await phone.open(path)
    await expect(page.getByRole('link', { name: 'All sent' })).toBeVisible({ timeout: 60_000 })
    await expect(board.getByText('The rattle, engine hot')).toBeVisible({ timeout: 40_000 })
    await key(board, 'Listen').click()
    await expect
      .poll(() => board.locator('audio').evaluate((audio: HTMLAudioElement) => audio.currentTime))
      .toBeGreaterThan(0.5)
    await shot(board, 'desk-voice')
  })

  await test.step('one whose bytes have not come says on whose phone it is', async () => {
    const sound = webmOf({ seconds: 22, noise: words })
    const voice = {
      hash: hashOf(sound),
      bytes: sound.length,
      mime: 'audio/webm',
      seconds: 22,
    } as const
    const body = { kind: 'voice', voice, caption: 'Still in the valley' } as const
    await other.send(logAdd(other.device, opening.fields.id, body))
    const line = board.getByText(/Voice note still on the phone of .*\(Test phone\).* old\./)
    await expect(line).toBeVisible()
    await expect(line).toContainText(/It last reached us \d\d:\d\d/)
    await other.sendPhoto(sound, 'audio/webm')
    await expect(line).toHaveCount(0)
    await expect(key(board, 'Listen')).toHaveCount(2)
  })
})
