import { type ChildProcess, spawn } from 'node:child_process'
import { once } from 'node:events'
import { mkdirSync } from 'node:fs'
import { createServer } from 'node:net'
import { join } from 'node:path'
import { startFiles } from '../../../scripts/fakes/files.mjs'

/** The product as `npm start` serves it, on its own port, that a test can stop, kill and start again. */
export type TestServer = {
  base: string
  start(): Promise<void>
  stop(): Promise<void>
  kill(): Promise<void>
  log(): string
  /** Stops it and the file store beside it. */
  close(): Promise<void>
}

const root = process.cwd()

async function freePort(): Promise<number> {
  const probe = createServer()
  probe.listen(0, '127.0.0.1')
  await once(probe, 'listening')
  const address = probe.address()
  probe.close()
  if (address === null || typeof address === 'string') throw new Error('no port')
  return address.port
}

function need(name: string): string {
  const value = process.env[name]
  if (!value) throw new Error(`${name} is not set: run the browser tests with npm test -- e2e`)
  return value
}

/** Makes a server on a free port; nothing runs until start(). */
export async function makeServer(): Promise<TestServer> {
  const port = await freePort()
  const mailPort = await freePort()
  const base = `http://127.0.0.1:${port}`
  const stage = join(root, '.data', 'e2e-stage')
  mkdirSync(stage, { recursive: true })
  const files = await startFiles({
    port: 0,
    folder: join(root, '.data', 'e2e-files'),
    bucket: 'e2e',
    key: 'e2e-key',
    secret: 'e2e-secret',
  })
  let child: ChildProcess | null = null
  let text = ''
  // A runner that is stopped leaves no server behind.
  const atExit = () => child?.kill('SIGKILL')
  process.on('exit', atExit)

  async function start(): Promise<void> {
    const mine = spawn(
      process.execPath,
      ['node_modules/next/dist/bin/next', 'start', '-H', '127.0.0.1', '-p', String(port)],
      {
        cwd: root,
        stdio: ['ignore', 'pipe', 'pipe'],
        env: {
          ...process.env,
          NODE_ENV: 'production',
          DATABASE_URL: need('DATABASE_URL'),
          NEXTAUTH_SECRET: need('NEXTAUTH_SECRET'),
          NEXTAUTH_URL: base,
          MAIL_URL: `smtp://127.0.0.1:${mailPort}`,
          FILES_URL: files.url,
          FILES_BUCKET: 'e2e',
          FILES_KEY: 'e2e-key',
          FILES_SECRET: 'e2e-secret',
          FILES_STAGE: stage,
        },
      },
    )
    child = mine
    mine.stdout.on('data', (data) => {
      text += data
    })
    mine.stderr.on('data', (data) => {
      text += data
    })
    for (let tries = 0; tries < 400; tries++) {
      if (mine.exitCode !== null) throw new Error(`the server ended: ${text}`)
      const up = await fetch(`${base}/api/health`).then(
        (answer) => answer.ok,
        () => false,
      )
      if (up) return
      await new Promise((wait) => setTimeout(wait, 50))
    }
    throw new Error(`the server does not answer: ${text}`)
  }

  async function end(signal: 'SIGTERM' | 'SIGKILL'): Promise<void> {
    const mine = child
    child = null
    if (!mine || mine.exitCode !== null || mine.signalCode !== null) return
    const gone = once(mine, 'exit')
    mine.kill(signal)
    // A browser's spare connections may hold the server open; npm start does not wait longer either.
    const late = setTimeout(() => mine.kill('SIGKILL'), 8000)
    await gone
    clearTimeout(late)
  }

  const close = async () => {
    await end('SIGTERM')
    process.off('exit', atExit)
    await files.stop()
  }
  const stop = () => end('SIGTERM')
  return { base, start, stop, kill: () => end('SIGKILL'), log: () => text, close }
}
