/// <reference lib="webworker" />
import {
  CacheFirst,
  ExpirationPlugin,
  NetworkOnly,
  type PrecacheEntry,
  Serwist,
  type SerwistGlobalConfig,
} from 'serwist'
import { browserSyncPorts } from '@/lib/ports/sync-ports'
import type { WorkerMessage } from '@/lib/sync/client/app-worker'
import { SEND_TAG, sendInBackground } from '@/lib/sync/client/background'
import { type BookAsk, fetchBook } from '@/lib/sync/client/book-fetch'
import { BookDb } from '@/lib/sync/client/book-store'
import { currentPerson, DeviceDb } from '@/lib/sync/client/device-db'

/**
 * The service worker. It answers every address under /field with the one document of its own build, so
 * that document, scripts and fonts never mix; it never keeps an API answer or a page's RSC payload. A
 * newer worker waits until the person takes it. It also fetches the code book, and sends unsent work
 * when the browser wakes it. scripts/build-sw.mjs writes the precache list in.
 */
declare const self: ServiceWorkerGlobalScope &
  SerwistGlobalConfig & { __SW_MANIFEST: (PrecacheEntry | string)[] | undefined }

const SHELL = '/field'
const OFFLINE = '/~offline'

const serwist = new Serwist({
  ...(self.__SW_MANIFEST === undefined ? {} : { precacheEntries: self.__SW_MANIFEST }),
  precacheOptions: { cleanupOutdatedCaches: true },
  skipWaiting: false,
  clientsClaim: true,
  navigationPreload: false,
})

const precached = async (path: string): Promise<Response> =>
  (await serwist.matchPrecache(path)) ?? Response.error()

const isUnderField = (path: string) => path === SHELL || path.startsWith(`${SHELL}/`)

serwist.registerCapture(
  ({ request, url, sameOrigin }) =>
    sameOrigin && request.mode === 'navigate' && isUnderField(url.pathname),
  async ({ request }) => (await serwist.matchPrecache(SHELL)) ?? (await fetch(request)),
)

serwist.registerCapture(
  ({ request, sameOrigin }) => sameOrigin && request.mode === 'navigate',
  new NetworkOnly({ plugins: [{ handlerDidError: () => precached(OFFLINE) }] }),
)

serwist.registerCapture(
  ({ request, url, sameOrigin }) =>
    sameOrigin && (url.pathname.startsWith('/api/') || request.headers.get('RSC') === '1'),
  new NetworkOnly(),
)

// Hashed build files of the pages that are not made for the field.
serwist.registerCapture(
  ({ url, sameOrigin }) => sameOrigin && url.pathname.startsWith('/_next/static/'),
  new CacheFirst({
    cacheName: 'build-files',
    plugins: [new ExpirationPlugin({ maxEntries: 120 })],
  }),
)

/**
 * A worker script read from a cache would take the cached address for its own and lose the fragment in
 * which its chunk list travels. So it is answered with a response that has no address. Before serwist's
 * own listeners.
 */
self.addEventListener('fetch', (event) => {
  if (event.request.destination !== 'worker') return
  event.stopImmediatePropagation()
  event.respondWith(workerScript(event.request))
})

async function workerScript(request: Request): Promise<Response> {
  const held = await serwist.matchPrecache(new URL(request.url).pathname)
  if (held === undefined) return fetch(request)
  return new Response(held.body, { status: held.status, headers: held.headers })
}

serwist.addEventListeners()

self.addEventListener('message', (event) => {
  const message = event.data as WorkerMessage | undefined
  if (message?.type === 'book') event.waitUntil(loadBook(message))
})

// Not waited for: a slow book must not hold up pages, nor a failing one the app's update.
const loadBookSoon = () => {
  loadBookOfCurrent().catch(() => undefined)
}
self.addEventListener('install', loadBookSoon)
self.addEventListener('activate', loadBookSoon)

self.addEventListener('sync', (event) => {
  if (event.tag === SEND_TAG) event.waitUntil(sendInBackground(browserSyncPorts))
})

async function loadBook(ask: BookAsk): Promise<void> {
  const db = new BookDb()
  try {
    await fetchBook(db, browserSyncPorts.network, ask)
  } finally {
    db.close()
  }
}

async function loadBookOfCurrent(): Promise<void> {
  const device = new DeviceDb()
  try {
    const person = await currentPerson(device)
    if (person !== null) await loadBook({ shopId: person.shopId })
  } finally {
    device.close()
  }
}
