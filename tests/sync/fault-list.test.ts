// Every fault of the fault list and every rule of the protocol has a test that names it, and the table of
// docs/spec/sync.md says where. So the list stays true.
import { readdirSync, readFileSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import ts from 'typescript'
import { describe, expect, it } from 'vitest'

const TESTS = fileURLToPath(new URL('..', import.meta.url))
const SPEC = fileURLToPath(new URL('../../docs/spec/sync.md', import.meta.url))
const FAULTS = Array.from({ length: 30 }, (_, at) => `fault ${at + 1}`)
const RULES = [
  ...Array.from({ length: 25 }, (_, at) => `P${at + 1}`),
  ...Array.from({ length: 5 }, (_, at) => `PH${at + 1}`),
]

/** Folders of tests: measurements are none, and hold other people's packages. */
const filesOf = (folder: string): string[] =>
  readdirSync(folder, { withFileTypes: true }).flatMap((found) => {
    const path = join(folder, found.name)
    if (found.isDirectory()) {
      return ['bench', 'support', 'node_modules'].includes(found.name) ? [] : filesOf(path)
    }
    return /\.test\.tsx?$/.test(found.name) ? [path] : []
  })

/** What is called: `it`, `describe`, `test.each`; null for a test that does not run. */
function calledBy(call: ts.CallExpression): string | null {
  let at: ts.Expression = call.expression
  while (!ts.isIdentifier(at)) {
    if (ts.isPropertyAccessExpression(at)) {
      if (['skip', 'todo', 'only', 'fails'].includes(at.name.text)) return null
      at = at.expression
    } else if (ts.isCallExpression(at)) at = at.expression
    else return null
  }
  return ['it', 'test', 'describe'].includes(at.text) ? at.text : null
}

/** The fixed words of a name; what a template fills in is left out. */
function wordsOf(name: ts.Expression | undefined): string | null {
  if (name === undefined) return null
  if (ts.isStringLiteralLike(name)) return name.text
  if (!ts.isTemplateExpression(name)) return null
  return name.head.text + name.templateSpans.map((span) => span.literal.text).join('')
}

/** Names of the tests of one file, each with the names of the groups it stands in. */
function namesIn(text: string, path = 'x.test.ts'): string[] {
  const names: string[] = []
  const visit = (node: ts.Node, groups: string) => {
    let inside = groups
    if (ts.isCallExpression(node)) {
      const called = calledBy(node)
      const words = called === null ? null : wordsOf(node.arguments[0])
      const runs = node.arguments.length > 1
      if (words !== null && runs && called === 'describe') inside = `${groups} ${words}`
      else if (words !== null && runs) names.push(`${groups} ${words}`)
    }
    ts.forEachChild(node, (child) => visit(child, inside))
  }
  visit(ts.createSourceFile(path, text, ts.ScriptTarget.Latest), '')
  return names
}

const names = new Map(
  filesOf(TESTS).map((path) => [relative(TESTS, path), namesIn(readFileSync(path, 'utf8'), path)]),
)
const holders = (tag: string): string[] =>
  [...names].flatMap(([file, of]) => (of.some((name) => name.includes(`[${tag}]`)) ? [file] : []))

describe('the list of what is tested', () => {
  it('reads the names of tests, groups and tables of tests, and of none that does not run', () => {
    const text = `
      describe('group [A]', () => { it('one [B]', () => {}); it.skip('two [C]', () => {}) })
      test.each([1])('three [D]', () => {}); it.todo('four [E]'); other('five [F]', () => {})
      it(\`six [G] \${x} [H]\`, () => {}); describe('empty [I]', () => {})
    `
    expect(namesIn(text)).toEqual([' group [A] one [B]', ' three [D]', ' six [G]  [H]'])
  })

  it.each(FAULTS)('%s has a test that names it', (fault) => {
    expect(holders(fault)).not.toEqual([])
  })

  it.each(RULES)('rule %s has a test that names it', (rule) => {
    expect(holders(rule)).not.toEqual([])
  })

  it('knows no fault beyond the list', () => {
    const named = [...names.values()]
      .flat()
      .join(' ')
      .matchAll(/\[fault (\d+)\]/g)
    const beyond = [...named].map(([, number]) => Number(number)).filter((n) => n < 1 || n > 30)
    expect(beyond).toEqual([])
  })

  it('stands in the specification: each fault with files that hold it', () => {
    const rows = [...readFileSync(SPEC, 'utf8').matchAll(/^\| (\d+) \| [^|]+ \| ([^|]+) \|$/gm)]
    expect(rows.map(([, number]) => `fault ${number}`)).toEqual(FAULTS)
    for (const [, number, where = ''] of rows) {
      const files = [...where.matchAll(/`([^`]+)`/g)].map(([, file]) => `${file}.test.ts`)
      expect(files, `fault ${number}`).not.toEqual([])
      const held = holders(`fault ${number}`)
      expect(held, `fault ${number}`).toEqual(expect.arrayContaining(files))
    }
  })
})
