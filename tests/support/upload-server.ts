// The handlers of an upload behind a bare HTTP server of a process of its own, so that a test can kill
// it with no chance to say goodbye. Prints its port.
import { createServer, type IncomingMessage } from 'node:http'
import type { AddressInfo } from 'node:net'
import { Readable } from 'node:stream'
import { HEAD, PATCH } from '@/app/api/photos/tus/[hash]/route'
import { POST } from '@/app/api/photos/tus/route'

function requestOf(from: IncomingMessage): Request {
  const headers = new Headers()
  for (const [name, value] of Object.entries(from.headers)) headers.set(name, String(value))
  const hasBody = from.method === 'PATCH'
  const body = hasBody ? { body: Readable.toWeb(from) as ReadableStream, duplex: 'half' } : {}
  return new Request(`http://shop.invalid${from.url}`, {
    method: from.method ?? 'GET',
    headers,
    ...body,
  })
}

function answerOf(request: Request): Promise<Response> {
  const hash = new URL(request.url).pathname.split('/').at(-1) ?? ''
  const context = { params: Promise.resolve({ hash }) }
  if (request.method === 'POST') return POST(request)
  return request.method === 'HEAD' ? HEAD(request, context) : PATCH(request, context)
}

const server = createServer((from, to) => {
  answerOf(requestOf(from)).then(
    async (answer) => {
      to.writeHead(answer.status, Object.fromEntries(answer.headers))
      to.end(from.method === 'HEAD' ? '' : Buffer.from(await answer.arrayBuffer()))
    },
    () => to.destroy(),
  )
})
server.listen(0, '127.0.0.1', () => {
  process.stdout.write(`port ${(server.address() as AddressInfo).port}\n`)
})
