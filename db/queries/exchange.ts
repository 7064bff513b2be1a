import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import type { Role } from '@/lib/model/role'
import type { Instant } from '@/lib/model/time'
import { askOften } from '../client'
import type { Contact, Device } from './devices'

/** Where a shop's log stands, and the scope version of the person who asks (P12). */
export type LogStand = { scopeVersion: number; epoch: string; seq: number; horizon: number }

/**
 * A phone that was found, with the person it belongs to: with the roles they have, or had when their
 * membership ended (`isMember`); null: nobody of the shop's people any more. `session`: whose session came
 * with it. `noted`: it was noted as heard by the same statement.
 */
export type Sender = {
  device: Device
  person: { actor: Actor; isMember: boolean } | null
  session: Actor | null
  stand: LogStand | null
  noted: boolean
}

type Row = Device & {
  roles: Role[] | null
  isMember: boolean
  personName: string | null
  sessionShop: Id | null
  sessionPerson: Id | null
  sessionName: string | null
  sessionRoles: Role[] | null
  scopeVersion: number | null
  epoch: string
  seq: number
  horizon: number
  noted: boolean
}

/**
 * Answers a phone of this shop with everything that an exchange begins with, in one statement; undefined when
 * the shop has no such phone. `sessionId`: of the session that came with the request, live or not. `seen`:
 * what is to be noted of the phone at once, if it may write and speaks out of the store that is known.
 */
export async function openExchange(of: {
  shopId: Id
  deviceId: Id
  sessionId: Id | null
  now: Instant
  seen: Contact | null
}): Promise<Sender | undefined> {
  const { shopId, deviceId, sessionId, now, seen } = of
  const told = seen === null ? null : JSON.stringify(seen)
  const [row] = await askOften<Row>({
    name: 'open_exchange',
    text: 'select * from open_exchange($1, $2, $3, $4, $5)',
    values: [shopId, deviceId, sessionId, now, told],
  })
  return row && { ...partsOf(row, shopId), session: sessionOf(row) }
}

function partsOf(row: Row, shopId: Id): Omit<Sender, 'session'> {
  const {
    roles,
    isMember,
    personName: name,
    scopeVersion,
    epoch,
    seq,
    horizon,
    noted,
    ...rest
  } = row
  const { sessionShop: _s, sessionPerson: _p, sessionName: _n, sessionRoles: _r, ...device } = rest
  const actor = roles && { shopId, personId: device.personId, roles, name }
  const person = actor && { actor, isMember }
  const stand = scopeVersion === null ? null : { scopeVersion, epoch, seq, horizon }
  return { device, person, stand, noted }
}

function sessionOf({ sessionShop, sessionPerson, sessionName, sessionRoles }: Row): Actor | null {
  if (sessionShop === null || sessionPerson === null) return null
  return {
    shopId: sessionShop,
    personId: sessionPerson,
    name: sessionName,
    roles: sessionRoles ?? [],
  }
}
