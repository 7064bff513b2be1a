import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { join } from 'node:path'
import { expect, test } from '@playwright/test'

/** Runs the loop in a process of its own, as it sets addresses and secrets for a database of its own. */
async function killLoop(args: string[]): Promise<{ status: number; text: string }> {
  const tsx = join('node_modules', '.bin', 'tsx')
  const child = spawn(tsx, ['tests/kill/kill.ts', ...args], { stdio: ['ignore', 'pipe', 'pipe'] })
  let text = ''
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (data) => {
      text += data
    })
  const stop = () => child.kill('SIGTERM')
  process.once('exit', stop)
  const late = setTimeout(stop, 340_000)
  const [status] = (await once(child, 'exit')) as [number | null]
  clearTimeout(late)
  process.off('exit', stop)
  return { status: status ?? 1, text }
}

test('[fault 1] [P4] loses and doubles nothing when the server is killed ten times while phones push', async () => {
  test.setTimeout(360_000)
  const { status, text } = await killLoop(['--only', 'server', '--rounds', '10', '--seed', '1'])
  console.log(text)
  expect(status, text).toBe(0)
  const counted = (name: string) => Number(new RegExp(`${name} (\\d+)`).exec(text)?.[1] ?? 0)
  expect(counted('rounds')).toBe(10)
  expect(counted('hit pushes in the air')).toBeGreaterThanOrEqual(5)
  expect(counted('unanswered ops')).toBeGreaterThan(0)
})
