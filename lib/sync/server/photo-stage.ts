import { readFile, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { FileStore } from '@tus/file-store'
import { Server } from '@tus/server'
import { env } from '@/lib/env'
import type { Id } from '@/lib/model/id'
import { AppError, fail, ok, type Result } from '@/lib/model/result'
import { TUS_VERSION, UPLOAD_HEADERS } from '@/lib/sync/protocol/upload'

/**
 * Where uploads lie until they are whole: a tus server over a durable folder. Chunks reach it only after
 * their check sum was compared, and it is never reached from outside: the route hands it requests of its
 * own. Several processes may share the folder: two writers of one upload write the same bytes to the
 * same place, and the whole is checked by its hash before anything believes it.
 */
export type StageProblem = { kind: 'notBegun' | 'wrongOffset' | 'gone' | 'tooLarge' }

/** Whose upload of which file; nobody else's request can name it. */
export type StageOwner = { shopId: Id; personId: Id; hash: string }

/** How far an upload has come, in bytes. */
export type Staged = { offset: number; size: number }

/** An upload that is not whole after so many days is given up (a choice: longer than a long trip). */
export const STAGE_DAYS = 30
export const STAGE_MS = STAGE_DAYS * 24 * 3600 * 1000

const stageId = ({ shopId, personId, hash }: StageOwner) => `${shopId}.${personId}.${hash}`

const opened = new Map<string, Server>()

function server(): Server {
  const directory = env().FILES_STAGE
  const held = opened.get(directory)
  if (held) return held
  const made = new Server({
    path: '/stage',
    relativeLocation: true,
    datastore: new FileStore({ directory, expirationPeriodInMilliseconds: STAGE_MS }),
    namingFunction: (request) => request.headers.get('x-stage-id') ?? '',
  })
  opened.set(directory, made)
  return made
}

const HEADERS = { [UPLOAD_HEADERS.version]: TUS_VERSION }

function ask(id: string, init: RequestInit): Promise<Response> {
  return server().handleWeb(new Request(`http://stage.invalid/stage/${id}`, init))
}

const numberOf = (answer: Response, name: string) => Number(answer.headers.get(name))

/** How far it has come. An upload whose notes cannot be read (a crash while it began) is dropped. */
export async function findStaged(owner: StageOwner): Promise<Result<Staged, StageProblem>> {
  const id = stageId(owner)
  const answer = await ask(id, { method: 'HEAD', headers: HEADERS })
  if (answer.status === 200) {
    const offset = numberOf(answer, UPLOAD_HEADERS.offset)
    return ok({ offset, size: numberOf(answer, UPLOAD_HEADERS.length) })
  }
  if (answer.status !== 404 && answer.status !== 410) await dropStaged(owner)
  return fail({ kind: answer.status === 410 ? 'gone' : 'notBegun' })
}

/** Begins an upload of `size` bytes; what was staged under this name goes. */
export async function beginStaged(owner: StageOwner, size: number): Promise<void> {
  const id = stageId(owner)
  await dropStaged(owner)
  const headers = { ...HEADERS, [UPLOAD_HEADERS.length]: String(size), 'x-stage-id': id }
  const answer = await server().handleWeb(
    new Request('http://stage.invalid/stage', { method: 'POST', headers }),
  )
  if (answer.status !== 201) throw notStaged(await answer.text())
}

/** Adds a chunk that stands at `offset`; answers how far it has come then. */
export async function addStaged(
  owner: StageOwner,
  at: { offset: number; chunk: Uint8Array },
): Promise<Result<number, StageProblem>> {
  const answer = await ask(stageId(owner), {
    method: 'PATCH',
    headers: {
      ...HEADERS,
      [UPLOAD_HEADERS.offset]: String(at.offset),
      'content-type': 'application/offset+octet-stream',
      'content-length': String(at.chunk.byteLength),
    },
    body: new Uint8Array(at.chunk),
  })
  switch (answer.status) {
    case 204:
      return ok(numberOf(answer, UPLOAD_HEADERS.offset))
    case 404:
      return fail({ kind: 'notBegun' })
    case 409:
      return fail({ kind: 'wrongOffset' })
    case 410:
      return fail({ kind: 'gone' })
    case 413:
      return fail({ kind: 'tooLarge' })
    default:
      throw notStaged(await answer.text())
  }
}

/** The bytes that came in; null when the upload is not there any more. */
export async function readStaged(owner: StageOwner): Promise<Buffer | null> {
  return await readFile(pathOf(owner)).catch(() => null)
}

/** Lets go of an upload, whole or not. */
export async function dropStaged(owner: StageOwner): Promise<void> {
  const path = pathOf(owner)
  await rm(path, { force: true })
  await rm(`${path}.json`, { force: true })
}

/** Lets go of every upload that is not whole after STAGE_DAYS; answers how many. */
export const dropExpired = (): Promise<number> => server().cleanUpExpiredUploads()

const pathOf = (owner: StageOwner) => join(env().FILES_STAGE, stageId(owner))

/** The stage's disk is full or away: what is sent is kept by the phone and comes again. */
const notStaged = (words: string) =>
  new AppError('notStaged', { retry: true, context: { words: words.trim() } })
