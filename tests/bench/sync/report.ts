// The table of bars, printed and written into docs/performance.md between its two marks.
import { execFileSync } from 'node:child_process'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { cpus, loadavg, totalmem } from 'node:os'
import type { Bar } from './bars'

const FILE = 'docs/performance.md'
const BEGIN = '<!-- bench:sync, written by npm run bench:sync -->'
const END = '<!-- end of bench:sync -->'

const ask = (command: string, args: string[]): string => {
  try {
    return execFileSync(command, args, {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    }).trim()
  } catch {
    return 'unknown'
  }
}

const versionOf = (name: string): string => {
  const file = `node_modules/${name}/package.json`
  return (JSON.parse(readFileSync(file, 'utf8')) as { version: string }).version
}

/** What was measured on, told before it begins: the load is that of others. */
export function machineOf(): string[] {
  const memory = `${Math.round(totalmem() / 2 ** 30)} GiB`
  return [
    `Machine: ${cpus().length} cores, ${memory}, load ${loadavg()[0]?.toFixed(1)} when it began`,
    `Date: ${new Date().toISOString().slice(0, 16).replace('T', ' ')} UTC, commit ${ask('git', ['rev-parse', '--short', 'HEAD'])}`,
    `Versions: Node ${process.versions.node}, Next.js ${versionOf('next')}, ${ask('/usr/bin/chromium', ['--version'])}, PostgreSQL ${ask('sh', ['-c', 'ls /usr/lib/postgresql'])}, Dexie ${versionOf('dexie')}, pg ${versionOf('pg')}`,
  ]
}

const HEAD = ['bar', 'what', 'bar is', 'measured', 'n', 'verdict']

function table(bars: readonly Bar[]): string {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`
  const rows = bars.map((bar) =>
    line([
      bar.id,
      bar.what,
      bar.bar,
      bar.measured,
      bar.n,
      bar.verdict === 'missed' ? '**missed**' : bar.verdict,
    ]),
  )
  return [line(HEAD), line(HEAD.map(() => '---')), ...rows].join('\n')
}

/** The bars as lines for the terminal. */
export const printed = (bars: readonly Bar[]): string =>
  bars
    .map(
      (bar) =>
        `${bar.verdict.padEnd(7)}${bar.id}  ${bar.what}: ${bar.measured}  [${bar.bar}] n=${bar.n}`,
    )
    .join('\n')

/** Writes the measured part of docs/performance.md; what people wrote around it stays. */
export function writeReport(of: {
  bars: readonly Bar[]
  machine: string[]
  withPeers: boolean
}): void {
  const command = `npm run bench:sync${of.withPeers ? ' -- --peers' : ''}`
  const facts = [`Command: \`${command}\``, ...of.machine].map((fact) => `- ${fact}`)
  const part = [BEGIN, '', ...facts, '', table(of.bars), '', END].join('\n')
  const text = existsSync(FILE) ? readFileSync(FILE, 'utf8') : `# Performance\n\n${BEGIN}\n${END}\n`
  const [from, to] = [text.indexOf(BEGIN), text.indexOf(END)]
  if (from < 0 || to < from) throw new Error(`${FILE} has lost its marks`)
  writeFileSync(FILE, `${text.slice(0, from)}${part}${text.slice(to + END.length)}`)
}
