/**
 * The code book by files: `npm run codebook:export -- --json FILE | --csv DIR`, `npm run codebook:import --
 * FILE|DIR`, which makes a draft, and `npm run codebook:publish`. Acts as the person `--as EMAIL` names (the
 * owner of the demo shop, when left out), with the rights of their roles.
 */
import { mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { basename, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { parseArgs } from 'node:util'
import { v7 } from 'uuid'
import { switchDatabase, withNoShop } from '@/db/client'
import type { BookProblem } from '@/db/codebook/book-problem'
import { readBookCsv, writeBookCsv } from '@/db/codebook/file-csv'
import { readBookJson, writeBookJson } from '@/db/codebook/file-json'
import { type FileProblem, problemLine, type ReadBook } from '@/db/codebook/file-problem'
import { findSignIn } from '@/db/queries/sign-in'
import { fail, ok, type Result } from '@/lib/model/result'
import { exportBook } from '@/lib/sync/server/book/export-book'
import { publishDraft } from '@/lib/sync/server/book/publish-draft'
import { type BookHand, takeDraft } from '@/lib/sync/server/book/take-draft'

/** A sentence for whoever typed the command; nothing was done. */
class Refused extends Error {}

const OPTIONS = {
  json: { type: 'string' },
  csv: { type: 'string' },
  version: { type: 'string' },
  draft: { type: 'boolean', default: false },
  note: { type: 'string' },
  replace: { type: 'boolean', default: false },
  as: { type: 'string', default: 'owner@demo.invalid' },
} as const
const read = (args: string[]) => parseArgs({ args, options: OPTIONS, allowPositionals: true })
type Args = ReturnType<typeof read>

async function handOf(email: string): Promise<BookHand> {
  const [found] = await withNoShop((tx) => findSignIn(tx, email))
  if (found === undefined) throw new Refused(`Nobody signs in as ${email}.`)
  return { actor: found, now: Date.now(), newId: v7 }
}

async function exportTo({ values }: Args): Promise<string> {
  const { actor } = await handOf(values.as)
  const which = values.draft
    ? 'draft'
    : values.version === undefined
      ? null
      : Number(values.version)
  const found = await exportBook(actor.shopId, which)
  if (found === undefined) throw new Refused('The shop has no such code book.')
  const { book, version, hash } = found
  const what = `${version === null ? 'The draft' : `Version ${version}`}, ${book.items.length} items`
  if (values.json !== undefined) {
    writeFileSync(values.json, writeBookJson(book, { version, hash }))
    return `${what}, is in ${values.json}`
  }
  if (values.csv === undefined) throw new Refused('Say where to: --json FILE or --csv DIR.')
  mkdirSync(values.csv, { recursive: true })
  const files = writeBookCsv(book)
  for (const [name, text] of files) writeFileSync(join(values.csv, name), text)
  return `${what}, is in ${files.size} files in ${values.csv}`
}

async function importFrom({ values, positionals }: Args): Promise<string> {
  const [path] = positionals
  if (path === undefined)
    throw new Refused('Say what to import: a JSON file, or a folder of CSV files.')
  const hand = await handOf(values.as)
  const file = readPath(path)
  if (!file.ok) throw new Refused(file.problem.map(problemLine).join('\n'))
  const { book, places } = file.value
  const taken = await takeDraft(hand, { book, note: values.note ?? null, replace: values.replace })
  if (!taken.ok) throw new Refused(SENTENCES[taken.problem.kind])
  const { items, hash, findings } = taken.value
  const lines = findings.map((finding) => findingLine(finding, places))
  const end =
    findings.length === 0
      ? 'Nothing hinders its publishing.'
      : `${findings.length} findings hinder its publishing.`
  return [...lines, `Draft of ${items} items, ${hash.slice(0, 12)}. ${end}`].join('\n')
}

function readPath(path: string): Result<ReadBook, FileProblem[]> {
  if (!statSync(path).isDirectory()) return readBookJson(readFileSync(path, 'utf8'), basename(path))
  const names = readdirSync(path).filter((name) => name.endsWith('.csv'))
  return readBookCsv(new Map(names.map((name) => [name, readFileSync(join(path, name), 'utf8')])))
}

function findingLine({ kind, id, words }: BookProblem, places?: ReadBook['places']): string {
  const place = places?.get(id)
  if (place === undefined) return `${kind}: ${id}: ${words}`
  return problemLine({ ...place, words: `${kind}: ${id}: ${words}` })
}

async function publish({ values }: Args): Promise<string> {
  const published = await publishDraft(await handOf(values.as))
  if (published.ok) return `Version ${published.value.version} is published.`
  const { problem } = published
  if (problem.kind === 'findings')
    throw new Refused(
      [...problem.findings.map((one) => findingLine(one)), SENTENCES.findings].join('\n'),
    )
  throw new Refused(SENTENCES[problem.kind])
}

const SENTENCES = {
  forbidden: 'The roles of this person do not allow it.',
  hasDraft: 'There is a draft already. Say --replace to put this one in its place.',
  noDraft: 'There is no draft to publish.',
  nothingNew: 'The draft is the newest version already.',
  overtaken: 'Another draft came meanwhile. Look at it, then publish.',
  findings: 'Not published: the book has to be right first.',
}

const COMMANDS = new Map([
  ['export', exportTo],
  ['import', importFrom],
  ['publish', publish],
])

/** Runs a command on the database behind asShop; answers what it says, and whether it was done. */
export async function bookCommand(name: string, args: string[]): Promise<Result<string, string>> {
  const command = COMMANDS.get(name)
  if (command === undefined) return fail('Say what to do: export, import or publish.')
  try {
    return ok(await command(read(args)))
  } catch (cause) {
    if (cause instanceof Refused) return fail(cause.message)
    throw cause
  }
}

if (process.argv[1] && resolve(process.argv[1]) === fileURLToPath(import.meta.url)) {
  const { startDatabase } = await import('./db.mjs')
  await switchDatabase(process.env.DATABASE_URL ?? (await startDatabase()).appUrl)
  const [name = '', ...args] = process.argv.slice(2)
  const done = await bookCommand(name, args)
  await switchDatabase(null)
  if (done.ok) console.log(done.value)
  else console.error(done.problem)
  process.exitCode = done.ok ? 0 : 1
}
