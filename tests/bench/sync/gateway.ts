// What stands between browser and server: serves the bench's page from the same origin and counts what
// crosses the line, the same for every arm.
import { once } from 'node:events'
import { Agent, createServer, type IncomingMessage, request, type ServerResponse } from 'node:http'
import type { AddressInfo, Socket } from 'node:net'

/** `bodies`: of both directions, as packed. `all`: with request lines, headers and framing. */
export type Crossed = { requests: number; up: number; down: number; bodies: number; all: number }

export type Gateway = {
  base: string
  /** Begins to count anew. */
  reset(): void
  crossed(): Crossed
  close(): Promise<void>
}

type Page = { html: string; scripts: Record<string, string> }

/** Opens a gateway before `target`; `/bench/` is its own, everything else goes on. */
export async function openGateway(target: string, page: Page): Promise<Gateway> {
  const agent = new Agent({ keepAlive: true, maxSockets: 20 })
  const sockets = new Set<Socket>()
  let closedBytes = 0
  let count = { requests: 0, up: 0, down: 0, zero: 0 }
  const wire = () =>
    closedBytes + [...sockets].reduce((sum, one) => sum + one.bytesRead + one.bytesWritten, 0)

  function pass(from: IncomingMessage, to: ServerResponse): void {
    count.requests += 1
    const { method } = from
    const onward = request(
      `${target}${from.url}`,
      { agent, method, headers: from.headers },
      (back) => {
        to.writeHead(back.statusCode ?? 502, back.rawHeaders)
        back.on('data', (part: Buffer) => {
          count.down += part.byteLength
        })
        back.pipe(to)
      },
    )
    onward.on('error', () => to.destroy())
    from.on('data', (part: Buffer) => {
      count.up += part.byteLength
    })
    from.pipe(onward)
  }

  const server = createServer((from, to) => {
    const own = /^\/bench\/(.*)$/.exec(from.url ?? '')?.[1]
    if (own === undefined) return pass(from, to)
    const script = page.scripts[own]
    const type = script === undefined ? 'text/html' : 'text/javascript'
    to.writeHead(own === '' || script !== undefined ? 200 : 404, { 'content-type': type })
    return to.end(script ?? (own === '' ? page.html : ''))
  })
  server.on('connection', (socket) => {
    sockets.add(socket)
    socket.on('close', () => {
      sockets.delete(socket)
      closedBytes += socket.bytesRead + socket.bytesWritten
    })
  })
  server.listen(0, '127.0.0.1')
  await once(server, 'listening')
  const { port } = server.address() as AddressInfo
  return {
    base: `http://127.0.0.1:${port}`,
    reset() {
      count = { requests: 0, up: 0, down: 0, zero: wire() }
    },
    crossed: () => {
      const { requests, up, down, zero } = count
      return { requests, up, down, bodies: up + down, all: wire() - zero }
    },
    async close() {
      agent.destroy()
      server.closeAllConnections()
      server.close()
      await once(server, 'close')
    },
  }
}
