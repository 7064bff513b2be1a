// The real route handlers and the page of the kill loop behind one address, in this process.
import { once } from 'node:events'
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import { join } from 'node:path'
import { build } from 'esbuild'
import { POST as postDevice } from '@/app/api/devices/route'
import { HEAD, PATCH } from '@/app/api/photos/tus/[hash]/route'
import { POST as postUpload } from '@/app/api/photos/tus/route'
import { POST as postSync } from '@/app/api/sync/route'

export type ShopLine = {
  base: string
  /** Called with the name of the step at which the page stands still; the page goes on when it resolves. */
  onHere: (step: string) => Promise<void>
  close(): Promise<void>
}

const UPLOADS = '/api/photos/tus'

function answerOf(path: string, request: Request): Promise<Response> {
  const context = { params: Promise.resolve({ hash: path.slice(UPLOADS.length + 1) }) }
  if (path === '/api/sync') return postSync(request)
  if (path === '/api/devices') return postDevice(request)
  if (path === UPLOADS) return postUpload(request)
  if (path.startsWith(UPLOADS) && request.method === 'HEAD') return HEAD(request, context)
  if (path.startsWith(UPLOADS) && request.method === 'PATCH') return PATCH(request, context)
  return Promise.resolve(new Response(null, { status: 404 }))
}

async function bodyOf(from: IncomingMessage): Promise<Buffer> {
  const parts: Buffer[] = []
  for await (const part of from) parts.push(part as Buffer)
  return Buffer.concat(parts)
}

function requestOf(from: IncomingMessage, body: Buffer): Request {
  const headers = new Headers()
  for (const [name, value] of Object.entries(from.headers)) headers.set(name, String(value))
  const method = from.method ?? 'GET'
  const hasBody = method !== 'GET' && method !== 'HEAD'
  const url = `http://shop.invalid${from.url}`
  return new Request(url, { method, headers, ...(hasBody ? { body: Uint8Array.from(body) } : {}) })
}

async function pageScript(): Promise<string> {
  const made = await build({
    entryPoints: [join('tests', 'kill', 'page', 'page.ts')],
    bundle: true,
    write: false,
    format: 'iife',
    platform: 'browser',
    target: ['chrome120'],
    alias: { '@': process.cwd() },
    logLevel: 'error',
  })
  return made.outputFiles[0]?.text ?? ''
}

export async function openShopLine(): Promise<ShopLine> {
  const script = await pageScript()
  const files: Record<string, [type: string, text: string]> = {
    '/kill/': [
      'text/html',
      '<!doctype html><title>kill</title><script src="/kill/page.js"></script>',
    ],
    '/kill/page.js': ['text/javascript', script],
  }

  async function pass(from: IncomingMessage, to: ServerResponse): Promise<void> {
    const path = from.url ?? ''
    const body = await bodyOf(from)
    const file = files[path]
    if (file !== undefined) {
      to.writeHead(200, { 'content-type': file[0] }).end(file[1])
    } else if (path === '/kill/here') {
      await line.onHere(body.toString('utf8'))
      to.end()
    } else {
      const answer = await answerOf(path, requestOf(from, body))
      const told = Buffer.from(await answer.arrayBuffer())
      to.writeHead(answer.status, Object.fromEntries(answer.headers))
      to.end(from.method === 'HEAD' ? '' : told)
    }
  }

  const server = createServer((from, to) => {
    pass(from, to).catch(() => to.destroy())
  })
  server.listen(0, '127.0.0.1')
  await once(server, 'listening')
  const line: ShopLine = {
    base: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    onHere: () => Promise.resolve(),
    async close() {
      server.closeAllConnections()
      server.close()
      await once(server, 'close')
    },
  }
  return line
}
