// Forms of the account are counted before next-auth reads them whole.
import { beforeEach, expect, it, vi } from 'vitest'
import { POST } from '@/app/api/auth/[...nextauth]/route'

const reached: string[] = []
vi.mock('next-auth', () => ({
  default: () => async (request: Request) => {
    reached.push(await request.text())
    return new Response('{}')
  },
}))
vi.mock('@/lib/auth/options', () => ({ authOptions: () => ({}) }))
beforeEach(() => {
  reached.length = 0
})

const context = { params: Promise.resolve({ nextauth: ['callback', 'credentials'] }) }
const post = (body: BodyInit, headers: Record<string, string> = {}) =>
  POST(
    new Request('http://shop.invalid/api/auth/callback/credentials', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded', ...headers },
      body,
      duplex: 'half',
    } as RequestInit),
    context,
  )

/** A body without a length, that notes how much of it was asked for. */
function endless() {
  let chunks = 0
  const stream = new ReadableStream<Uint8Array>({
    pull(controller) {
      chunks += 1
      controller.enqueue(new Uint8Array(1024))
    },
  })
  return { stream, chunks: () => chunks }
}

it('[D4] a form of the usual size reaches the account as it was sent', async () => {
  const form = 'email=one%40test.invalid&password=a%20good%20long%20one&csrfToken=abc&json=true'
  expect((await post(form)).status).toBe(200)
  expect(reached).toEqual([form])
})

it('[D4] one without a body too', async () => {
  await post('')
  expect(reached).toEqual([''])
})

it('[D4] more than 8 KiB is answered 413, and not read to its end', async () => {
  const { stream, chunks } = endless()
  expect((await post(stream)).status).toBe(413)
  expect(chunks()).toBeLessThan(20)
  expect((await post('x'.repeat(8 * 1024 + 1))).status).toBe(413)
  expect((await post('x', { 'content-length': '500000000' })).status).toBe(413)
  expect(reached).toEqual([])
})
