// Child processes that serve: the product, the floor and the peers, each on a free loopback port.
import { type ChildProcess, spawn } from 'node:child_process'
import { once } from 'node:events'
import { createServer } from 'node:net'

export type Served = { base: string; stop(): Promise<void>; log(): string }

/** A loopback port that was free a moment ago. */
export async function freePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1')
  await once(probe, 'listening')
  const address = probe.address()
  probe.close()
  if (address === null || typeof address === 'string') throw new Error('no port')
  return address.port
}

/** Starts `args` with node and waits until `path` answers anything below 500. */
export async function serve(of: {
  args: (port: number) => string[]
  path: string
  env: (base: string) => Record<string, string>
  cwd?: string
}): Promise<Served> {
  const port = await freePort()
  const base = `http://127.0.0.1:${port}`
  const child = spawn(process.execPath, of.args(port), {
    cwd: of.cwd ?? process.cwd(),
    stdio: ['ignore', 'pipe', 'pipe'],
    env: { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1', ...of.env(base) },
  })
  let text = ''
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (data) => {
      text = (text + data).slice(-20_000)
    })
  const served = { base, stop: () => stop(child), log: () => text }
  for (let tries = 0; tries < 600; tries += 1) {
    if (child.exitCode !== null) throw new Error(`${of.args(port).join(' ')} ended:\n${text}`)
    const status = await fetch(`${base}${of.path}`).then(
      (answer) => answer.status,
      () => 599,
    )
    if (status < 500) return served
    await new Promise((done) => setTimeout(done, 100))
  }
  await served.stop()
  throw new Error(`${of.args(port).join(' ')} does not answer:\n${text}`)
}

async function stop(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return
  const gone = once(child, 'exit')
  child.kill('SIGTERM')
  const late = setTimeout(() => child.kill('SIGKILL'), 8000)
  await gone
  clearTimeout(late)
}
