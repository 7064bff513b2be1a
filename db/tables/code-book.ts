import type { JSONColumnType } from 'kysely'
import type { Withdrawn } from '@/lib/model/book-withdrawal'
import type { CodeBookItem } from '@/lib/model/code-book'

/** Two faults left together with a reason (rule CB11), as kept with a version. */
export type KeptUnseparated = { faults: [string, string]; reason: string }

export type CodeBookVersionTable = {
  shopId: string
  version: number
  hash: string
  publishedAt: string
  publishedBy: string | null
  basedOn: number | null
  madeBy: string | null
  note: string | null
  unseparated: JSONColumnType<KeptUnseparated[], string | undefined>
}

export type CodeBookItemTable = {
  shopId: string
  version: number
  kind: CodeBookItem['kind']
  itemId: string
  place: number
  hash: string
}

export type CodeBookContentTable = {
  shopId: string
  hash: string
  kind: CodeBookItem['kind']
  itemId: string
  body: JSONColumnType<CodeBookItem>
}

export type CodeBookWithdrawalTable = {
  shopId: string
  id: string
  what: Withdrawn
  itemId: string | null
  version: number | null
  name: string
  hashes: string[]
  reason: string
  instead: string | null
  withdrawnAt: string
  withdrawnBy: string | null
}

export type CodeBookHeardTable = {
  shopId: string
  withdrawalId: string
  personId: string
  deviceId: string
  heardAt: string
  receivedAt: string
}

export type CodeBookDraftTable = {
  shopId: string
  hash: string
  basedOn: number | null
  madeAt: string
  madeBy: string | null
  note: string | null
  unseparated: JSONColumnType<KeptUnseparated[], string | undefined>
}

export type CodeBookDraftItemTable = {
  shopId: string
  kind: CodeBookItem['kind']
  itemId: string
  place: number
  hash: string
}
