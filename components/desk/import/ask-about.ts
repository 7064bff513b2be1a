import type { FileLine, FileRefusal } from '@/lib/ports/file-line'
import { type ImportAnswer, importAnswer } from '@/lib/sync/protocol/unsent-file'

const PATH = '/api/desk/import'
const SIGNED_OUT = 'You are signed out. Sign in again, then look again.'
const LOOKING: Record<string, string> = {
  noConnection: 'No answer from the shop. Look again in a moment.',
  serverTrouble: 'The shop’s server did not answer as it should. Look again in a moment.',
  signIn: SIGNED_OUT,
}
/** The reply may have been lost after the file was taken: nothing here says that it was not. */
const NOT_SURE =
  'No answer that can be read, so it is not sure whether it was taken. Look again: what the shop has is not taken twice.'
const TAKING: Record<string, string> = {
  noConnection: NOT_SURE,
  serverTrouble: NOT_SURE,
  signIn: SIGNED_OUT,
}

/** What is shown of a file: what was last found in it, and why the last question has no answer. */
export type FileShown = { list: ImportAnswer | null; refusal: string | null }

type Question = {
  /** Take it in; else only look what is in it. */
  take: boolean
  /** What was found in this very file before; kept when the question has no answer. */
  list: ImportAnswer | null
}

/** Looks at a phone's file, or takes it in, and says what became of that (IM1, IM2). */
export async function askAbout(line: FileLine, file: Blob, asked: Question): Promise<FileShown> {
  const answer = await line.post(asked.take ? `${PATH}?do=take` : PATH, file)
  const read = answer.ok ? importAnswer.safeParse(answer.value) : null
  if (read?.success === true) return { list: read.data, refusal: null }
  const problem = answer.ok ? { kind: 'serverTrouble', title: null } : answer.problem
  return { list: asked.list, refusal: sentence(problem, asked.take ? TAKING : LOOKING) }
}

const sentence = ({ kind, title }: FileRefusal, table: Record<string, string>): string =>
  table[kind] ?? title ?? 'The file was not taken.'
