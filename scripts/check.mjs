// npm run check: style, types, import directions, unused code, the clock rule, the code book.
// Prints one line per check and a sum; every check runs even when an earlier one fails.
import { spawnSync } from 'node:child_process'
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

const bin = (name) => join('node_modules', '.bin', name)

/** Product code never reads the system clock itself (house rule): only the clock port does. */
function clockRule() {
  const found = []
  const walk = (folder) => {
    for (const entry of readdirSync(folder, { withFileTypes: true })) {
      const path = join(folder, entry.name)
      if (entry.isDirectory()) walk(path)
      else if (
        /\.tsx?$/.test(path) &&
        !/\.test\.tsx?$/.test(path) &&
        !path.startsWith('lib/ports/')
      )
        readFileSync(path, 'utf8')
          .split('\n')
          .forEach((line, index) => {
            if (
              /\bDate\.now\(|new Date\(\)|Math\.random\(|performance\.now\(/.test(line) &&
              !/^\s*(\*|\/\/)/.test(line)
            )
              found.push(`${path}:${index + 1}: ${line.trim()}`)
          })
    }
  }
  for (const folder of ['app', 'components', 'lib', 'db']) walk(folder)
  return found
}

const commands = [
  ['style (biome)', bin('biome'), ['check', '--error-on-warnings', '.']],
  ['route types (next typegen)', bin('next'), ['typegen']],
  ['types (tsc)', bin('tsc'), ['--noEmit']],
  [
    'import directions (dependency-cruiser)',
    bin('depcruise'),
    [
      'app',
      'components',
      'lib',
      'db',
      'migrations',
      'scripts',
      'tests',
      'proxy.ts',
      '--config',
      '.dependency-cruiser.cjs',
    ],
  ],
  ['unused code (knip)', bin('knip'), []],
  [
    'code that only tests use (knip)',
    bin('knip'),
    ['-c', 'knip.shipped.jsonc', '--include', 'files,exports,types'],
  ],
  ['code book', bin('tsx'), ['scripts/codebook-check.ts']],
]

let passed = 0
let failed = 0
for (const [name, command, args] of commands) {
  const began = Date.now()
  const done = spawnSync(command, args, { encoding: 'utf8', maxBuffer: 64e6 })
  const good = done.status === 0
  good ? passed++ : failed++
  console.log(`${good ? 'ok  ' : 'FAIL'} ${name} (${((Date.now() - began) / 1000).toFixed(1)} s)`)
  if (!good) console.log(`${done.stdout}\n${done.stderr}`)
}
const clocks = clockRule()
clocks.length === 0 ? passed++ : failed++
console.log(`${clocks.length === 0 ? 'ok  ' : 'FAIL'} system clock only behind its port`)
for (const line of clocks) console.log(`  ${line}`)
mkdirSync(join('.data', 'results'), { recursive: true })
writeFileSync(join('.data', 'results', 'check.json'), JSON.stringify({ passed, failed }))
console.log(`check: ${passed} passed, ${failed} failed`)
process.exit(failed === 0 ? 0 : 1)
