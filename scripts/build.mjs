// The production build: Next.js, the policy's hashes, then the service worker with its precache list.
import { spawnSync } from 'node:child_process'

for (const args of [
  ['node_modules/next/dist/bin/next', 'build'],
  ['scripts/build-csp.mjs'],
  ['scripts/build-sw.mjs'],
]) {
  const run = spawnSync(process.execPath, args, {
    stdio: 'inherit',
    env: { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
  })
  if (run.status !== 0) process.exit(run.status ?? 1)
}
