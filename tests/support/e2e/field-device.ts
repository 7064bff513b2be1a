import { createHash } from 'node:crypto'
import { request } from '@playwright/test'
import { RawDevice } from '../raw-device'

/** A mechanic's phone without a browser: signed in at a running server, enrolled, and able to send. */
export type FieldDevice = {
  device: RawDevice
  /** Sends ops in one push; fails unless the shop takes every one. */
  send(...ops: Parameters<RawDevice['op']>[0][]): Promise<void>
  /** Sends a picture's bytes; answers the hash they go by. */
  sendPhoto(bytes: Uint8Array, mime: string): Promise<void>
}

export const hashOf = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex')

/** Signs `email` in with the demo password and enrols a new phone for them. */
export async function makeFieldDevice(base: string, email: string): Promise<FieldDevice> {
  const account = await request.newContext({ baseURL: base })
  const { csrfToken } = (await (await account.get('/api/auth/csrf')).json()) as {
    csrfToken: string
  }
  await account.post('/api/auth/callback/credentials', {
    form: {
      csrfToken,
      email,
      password: process.env.DEMO_PASSWORD ?? '',
      json: 'true',
      callbackUrl: '/',
    },
  })
  const me = (await (await account.get('/api/me')).json()) as { shopId: string; personId: string }
  const device = new RawDevice(me)
  const enrolled = await account.post('/api/devices', {
    data: { deviceId: device.id, publicKey: device.publicKey, words: 'Test phone' },
  })
  if (!enrolled.ok()) throw new Error(`not enrolled: ${enrolled.status()}`)
  await account.dispose()

  async function at(made: Request, path: string): Promise<unknown> {
    const answer = await fetch(`${base}${path}`, {
      method: made.method,
      headers: made.headers,
      body: await made.arrayBuffer(),
    })
    if (!answer.ok) throw new Error(`${path} answered ${answer.status}: ${await answer.text()}`)
    return answer.json()
  }

  return {
    device,
    async send(...inputs) {
      const ops = inputs.map((input) => device.op(input))
      const answer = (await at(device.push(ops), '/api/sync')) as {
        taken: string[]
        results: unknown[]
      }
      if (answer.taken.length !== ops.length || answer.results.length > 0)
        throw new Error(`refused: ${JSON.stringify(answer.results)}`)
    },
    async sendPhoto(bytes, mime) {
      const hash = hashOf(bytes)
      await at(device.photo(bytes, hash, mime), `/api/photos/${hash}`)
    },
  }
}
