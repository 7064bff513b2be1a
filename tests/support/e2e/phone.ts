import { readdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { type BrowserContext, chromium, type Page } from '@playwright/test'

export const CHROMIUM = '/usr/bin/chromium'
export const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--use-fake-device-for-media-stream',
]

/** A browser with its own profile on disk: it can be closed, killed and started cold like an app. */
export type Phone = {
  page(): Page
  context(): BrowserContext
  open(path: string): Promise<Page>
  close(): Promise<void>
  /** Flight mode on or off; it stays so when the phone is closed and started again. */
  flight(on: boolean): Promise<void>
  /** Ends every process of the browser with SIGKILL, as a phone that dies. */
  kill(): Promise<void>
}

function processesOf(profile: string): number[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .map(Number)
    .filter((pid) => {
      try {
        return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(profile)
      } catch {
        return false
      }
    })
}

type Look = { width: number; height: number; colorScheme?: 'light' | 'dark' }

/** Makes a phone (or a desk, by its size) whose profile lies in `profile`; `base` is the server's address. */
export function makePhone(profile: string, base: string, look: Look): Phone {
  let live: BrowserContext | null = null
  let tab: Page | null = null
  let flying = false
  const page = () => {
    if (!tab) throw new Error('the phone is off')
    return tab
  }
  const context = () => {
    if (!live) throw new Error('the phone is off')
    return live
  }

  async function open(path: string): Promise<Page> {
    if (!live) {
      for (const name of ['SingletonLock', 'SingletonSocket', 'SingletonCookie'])
        rmSync(join(profile, name), { force: true })
      live = await chromium.launchPersistentContext(profile, {
        executablePath: CHROMIUM,
        headless: true,
        args: FLAGS,
        baseURL: base,
        viewport: { width: look.width, height: look.height },
        colorScheme: look.colorScheme ?? 'light',
        geolocation: { latitude: 47.1, longitude: -93.2, accuracy: 12 },
        permissions: ['geolocation'],
        timezoneId: 'Etc/GMT+6',
        locale: 'en-GB',
      })
      live.setDefaultTimeout(20_000)
      await live.setOffline(flying)
      tab = live.pages()[0] ?? (await live.newPage())
    }
    await page().goto(path)
    return page()
  }

  async function close(): Promise<void> {
    await live?.close()
    live = null
    tab = null
  }

  async function flight(on: boolean): Promise<void> {
    flying = on
    await live?.setOffline(on)
  }

  async function kill(): Promise<void> {
    const old = live
    live = null
    tab = null
    for (const pid of processesOf(profile)) {
      try {
        process.kill(pid, 'SIGKILL')
      } catch {
        // Ended between the look and the kill.
      }
    }
    await old?.close().catch(() => undefined)
  }

  return { page, context, open, close, flight, kill }
}
