/**
 * `npm run diag -- FILE.json`: the engine's answer to one model file (engine models: `single` or `noisyor`),
 * as JSON on standard output. A bad file gets one sentence that names the field, and exit code 1.
 */
import { readFileSync } from 'node:fs'
import { jsonBreak } from '@/lib/diag/json-break'
import { readModel } from '@/lib/diag/read-model'
import { marginals, nextAction, posterior } from '@/lib/diag/troubleshoot'
import { START } from '@/lib/diag/troubleshoot-model'
import { AppError } from '@/lib/model/result'

/** The answer to a file's text, or the sentence that says what is wrong with it. */
export function answerTo(text: string): { ok: boolean; text: string; notices: string[] } {
  let json: unknown
  try {
    json = JSON.parse(text)
  } catch {
    return { ok: false, text: notJson(text), notices: [] }
  }
  const read = readModel(json)
  if (!read.ok) return { ok: false, text: read.problem.sentence, notices: [] }
  const { model, state, notices } = read.value
  const at = state ?? START
  try {
    const answer =
      model.kind === 'single'
        ? { next: nextAction(model, at), posterior: posterior(model, at) }
        : { marginals: marginals(model) }
    return { ok: true, text: JSON.stringify(answer, null, 2), notices }
  } catch (error) {
    if (!(error instanceof AppError)) throw error
    return { ok: false, text: sentenceOf(error), notices }
  }
}

/** Where the text stops being JSON, with the field it stops in. */
function notJson(text: string): string {
  const at = jsonBreak(text)
  if (at === null) return 'The file is not JSON.'
  const place = `line ${at.line}, column ${at.column}`
  const field = at.field === '' ? '' : `, in "${at.field.slice(0, 120)}"`
  return at.word === null
    ? `The file is not JSON: it ends at ${place}${field}.`
    : `The file is not JSON: ${JSON.stringify(at.word)} cannot stand at ${place}${field}.`
}

/** What the engine refuses, by kind. */
function sentenceOf({ kind, context }: AppError): string {
  if (kind === 'impossible') return '"evidence" cannot come about under this model.'
  if (kind === 'noAction') return '"stops" must hold a way to end the job, as no repair can.'
  if (kind === 'tooLarge') return '"evidence" holds more present findings over one another than 20.'
  return `"${String(context.field ?? 'the file')}" is not right.`
}

function textOf(file: string): string | null {
  try {
    return readFileSync(file, 'utf8')
  } catch {
    return null
  }
}

function main(file: string | undefined): number {
  if (file === undefined) {
    console.error('Name a file: npm run diag -- FILE.json')
    return 1
  }
  const text = textOf(file)
  if (text === null) {
    console.error(`"${file}" cannot be read as a file.`)
    return 1
  }
  const answer = answerTo(text)
  for (const notice of answer.notices) console.error(notice)
  if (answer.ok) console.log(answer.text)
  else console.error(answer.text)
  return answer.ok ? 0 : 1
}

if (process.argv[1]?.endsWith('diag.ts') === true) process.exitCode = main(process.argv[2])
