import type { Role } from '@/lib/model/role'

/** An op, or the bytes of a photo or voice note, of a phone that may not write any more (R22). */
export type QuarantineOpTable = {
  shopId: string
  opId: string
  deviceId: string
  personId: string
  roles: Role[]
  dseq: number
  kind: string
  entityId: string | null
  jobId: string | null
  fileHash: string | null
  raw: string
  why: 'deviceRevoked' | 'membershipEnded'
  receivedAt: string
}

/** The owner's word on it. */
export type QuarantineDecisionTable = {
  shopId: string
  opId: string
  decision: 'accepted' | 'refused'
  reason: string | null
  decidedBy: string
  decidedAt: string
}
