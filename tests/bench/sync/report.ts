// The table of bars, printed and written into docs/performance.md.
import { readFileSync } from 'node:fs'
import { ask, machineFacts, table, writePart } from '../marked-part'
import type { Bar } from './bars'

const versionOf = (name: string): string => {
  const file = `node_modules/${name}/package.json`
  return (JSON.parse(readFileSync(file, 'utf8')) as { version: string }).version
}

/** What was measured on, told before it begins. */
export function machineOf(): string[] {
  return [
    ...machineFacts(),
    `Versions: Node ${process.versions.node}, Next.js ${versionOf('next')}, ${ask('/usr/bin/chromium', ['--version'])}, PostgreSQL ${ask('sh', ['-c', 'ls /usr/lib/postgresql'])}, Dexie ${versionOf('dexie')}, pg ${versionOf('pg')}`,
  ]
}

const HEAD = ['bar', 'what', 'bar is', 'measured', 'n', 'verdict']
const rowOf = (bar: Bar): string[] => {
  const verdict = bar.verdict === 'missed' ? '**missed**' : bar.verdict
  return [bar.id, bar.what, bar.bar, bar.measured, bar.n, verdict]
}

/** The bars as lines for the terminal. */
export const printed = (bars: readonly Bar[]): string =>
  bars
    .map(
      (bar) =>
        `${bar.verdict.padEnd(7)}${bar.id}  ${bar.what}: ${bar.measured}  [${bar.bar}] n=${bar.n}`,
    )
    .join('\n')

/** Writes the measured part of docs/performance.md. */
export function writeReport(of: {
  bars: readonly Bar[]
  machine: string[]
  withPeers: boolean
}): void {
  const command = `npm run bench:sync${of.withPeers ? ' -- --peers' : ''}`
  writePart({
    name: 'bench:sync',
    facts: [`Command: \`${command}\``, ...of.machine],
    body: table(HEAD, of.bars.map(rowOf)),
  })
}
