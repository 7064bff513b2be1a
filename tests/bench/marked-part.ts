// docs/performance.md holds what each benchmark measured between two marks of its own.
import { execFileSync } from 'node:child_process'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { cpus, loadavg, totalmem } from 'node:os'

const FILE = 'docs/performance.md'

/** What a command prints; `unknown` where it is not there. */
export const ask = (command: string, args: string[]): string => {
  try {
    return execFileSync(command, args, {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    }).trim()
  } catch {
    return 'unknown'
  }
}

/** The machine and the day, told before a measurement begins: the load is that of others. */
export const machineFacts = (): string[] => [
  `Machine: ${cpus().length} cores, ${Math.round(totalmem() / 2 ** 30)} GiB, load ${loadavg()[0]?.toFixed(1)} when it began`,
  `Date: ${new Date().toISOString().slice(0, 16).replace('T', ' ')} UTC, commit ${ask('git', ['rev-parse', '--short', 'HEAD'])}`,
]

export const mean = (xs: readonly number[]) => xs.reduce((a, b) => a + b, 0) / xs.length

/** A table in Markdown. */
export function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`
  return [line(head), line(head.map(() => '---')), ...rows.map(line)].join('\n')
}

/** Writes what `name` measured into docs/performance.md; everything else in it stays. */
export function writePart(of: { name: string; facts: readonly string[]; body: string }): void {
  const begin = `<!-- ${of.name}, written by npm run ${of.name} -->`
  const end = `<!-- end of ${of.name} -->`
  const facts = of.facts.map((fact) => `- ${fact}`)
  const part = [begin, '', ...facts, '', of.body, '', end].join('\n')
  const text = existsSync(FILE) ? readFileSync(FILE, 'utf8') : '# Performance\n'
  const [from, to] = [text.indexOf(begin), text.indexOf(end)]
  if (from < 0 && to < 0) writeFileSync(FILE, `${text.trimEnd()}\n\n${part}\n`)
  else if (from < 0 || to < from) throw new Error(`${FILE} has lost a mark of ${of.name}`)
  else writeFileSync(FILE, `${text.slice(0, from)}${part}${text.slice(to + end.length)}`)
}
