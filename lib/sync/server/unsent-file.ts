import { verify } from 'node:crypto'
import { standOf } from '@/db/queries/device-stand'
import type { Device } from '@/db/queries/devices'
import { openExchange } from '@/db/queries/exchange'
import type { Quarantine } from '@/db/queries/quarantine'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import {
  fileText,
  UNSENT_FORMAT,
  type UnsentBody,
  type UnsentFile,
  unsentBody,
  unsentFile,
} from '@/lib/sync/protocol/unsent-file'
import { bodyHashOf } from './signed-request'

/** Why a whole file is refused; each has its one sentence at the desk. */
export type FileProblem = {
  kind: 'notOurFile' | 'olderFile' | 'changedFile' | 'otherShop' | 'unknownPhone' | 'personLeft'
}

/**
 * A file that is what it says: from that phone, of that person, unchanged. `quarantine`: why what is in it
 * waits for the owner's word, as what that phone sends does (IM4).
 */
export type CheckedFile = {
  actor: Actor
  device: Device
  quarantine: Quarantine | null
  madeAt: string
  body: UnsentBody
}

/**
 * Checks a file of unsent work for the shop of whoever brings it (IM1): shape, shop, phone, person and
 * the phone's signature over every byte of it. Nothing of it is looked into before the signature fits.
 */
export async function checkFile(
  desk: Pick<Actor, 'shopId'>,
  text: string,
): Promise<Result<CheckedFile, FileProblem>> {
  const file = readFrame(text)
  if (!file.ok) return file
  const { shop, person, device: deviceId, at } = file.value
  if (shop !== desk.shopId) return fail({ kind: 'otherShop' })
  const asked = { shopId: desk.shopId, deviceId, sessionId: null, now: at, seen: null }
  const found = await openExchange(asked)
  if (found?.device.personId !== person) return fail({ kind: 'unknownPhone' })
  const { device } = found
  if (!isSigned(file.value, device)) return fail({ kind: 'changedFile' })
  const stand = standOf(found)
  if (!stand) return fail({ kind: 'personLeft' })
  const body = unsentBody.safeParse(jsonOf(file.value.body))
  if (!body.success) return fail({ kind: 'notOurFile' })
  return ok({ ...stand, device, madeAt: at, body: body.data })
}

function readFrame(text: string): Result<UnsentFile, FileProblem> {
  const json = jsonOf(text)
  const read = unsentFile.safeParse(json)
  if (read.success) return ok(read.data)
  const format = (json as { format?: unknown } | undefined)?.format
  if (format === 'farbench-unsent-1') return fail({ kind: 'olderFile' })
  // It calls itself ours, but its frame has been cut or edited.
  return fail({ kind: format === UNSENT_FORMAT ? 'changedFile' : 'notOurFile' })
}

function isSigned(file: UnsentFile, device: Device): boolean {
  const { shop, person, device: id, at, body, signature } = file
  const words = fileText({ shop, person, device: id, at, bodyHash: bodyHashOf(Buffer.from(body)) })
  const key = { key: { ...device.publicKey }, format: 'jwk', dsaEncoding: 'ieee-p1363' } as const
  return verify('sha256', Buffer.from(words), key, Buffer.from(signature, 'base64url'))
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}
