import type { Generated, JSONColumnType } from 'kysely'
import type { Role } from '@/lib/model/role'

export type PersonTable = {
  shopId: string
  id: string
  createdAt: Generated<string>
  erasedAt: string | null
  deletedAt: string | null
}

/** Names, phones and e-mails, apart so that they can be erased (R23). */
export type PersonContactTable = {
  shopId: string
  personId: string
  name: string | null
  phone: string | null
  email: string | null
}

export type MembershipTable = {
  shopId: string
  personId: string
  roles: Role[]
  scopeVersion: Generated<number>
  createdAt: Generated<string>
  revokedAt: string | null
}

export type CredentialTable = {
  shopId: string
  personId: string
  passwordHash: string
  changedAt: Generated<string>
}

export type SessionTable = {
  shopId: string
  id: string
  personId: string
  createdAt: string
  expiresAt: string
  revokedAt: string | null
}

/** The public half of a phone's signing key, ECDSA P-256. */
export type PublicJwk = { kty: 'EC'; crv: 'P-256'; x: string; y: string }

export type DeviceTable = {
  shopId: string
  id: string
  personId: string
  name: string
  publicKey: JSONColumnType<PublicJwk>
  highestDseq: Generated<number>
  enrolledAt: string
  lastSeenAt: string | null
  clockOffsetMs: number | null
  revokedAt: string | null
  revokedBy: string | null
  revokedReason: string | null
  revokedRoles: Role[] | null
  heldOps: number | null
  heldPhotos: number | null
  heldOldestAt: string | null
  heldToldAt: string | null
  canary: string | null
  bookVersion: number | null
  gapsToldAt: string | null
  replacedBy: string | null
  replacedAt: string | null
  lostOps: number | null
  lostLastOn: string | null
  deletedOps: number | null
  wipeToldAt: string | null
}

export type PartyTable = {
  shopId: string
  id: string
  kind: 'rider' | 'machineOwner' | 'payer' | 'siteContact' | 'hirer'
  createdAt: Generated<string>
  erasedAt: string | null
}

export type PartyContactTable = {
  shopId: string
  partyId: string
  name: string | null
  phone: string | null
  email: string | null
}
