import type { Generated, JSONColumnType } from 'kysely'
import type { Bag } from '@/lib/model/bag'
import type { Features } from '@/lib/model/features'
import type { SpecSheet } from '@/lib/model/machine-model'
import type { MeterProfile } from '@/lib/model/meter-profile'

export type MachineModelTable = {
  shopId: string
  id: string
  maker: string
  model: string
  features: JSONColumnType<Features>
  specSheet: JSONColumnType<SpecSheet> | null
  source: string
  updatedAt: Generated<string>
  deletedAt: string | null
}

export type MachineTable = {
  shopId: string
  id: string
  modelId: string | null
  unitNumber: string | null
  makerTyped: string | null
  modelTyped: string | null
  year: number | null
  serial: string | null
  hours: number | null
  features: JSONColumnType<Features>
  fleet: boolean
  updatedAt: Generated<string>
  deletedAt: string | null
  revived: Generated<boolean>
  mergedInto: string | null
  mergedRoot: string | null
}

export type MeterProfileTable = {
  shopId: string
  id: string
  name: string
  functions: JSONColumnType<MeterProfile['functions']>
  leadsOhm: JSONColumnType<MeterProfile['leadsOhm']>
  perKelvin: number
  source: string
  updatedAt: Generated<string>
  deletedAt: string | null
}

export type BagTable = {
  shopId: string
  id: string
  personId: string
  parts: JSONColumnType<Bag['parts']>
  tools: string[]
  meterIds: string[]
  updatedAt: Generated<string>
  deletedAt: string | null
}

export type BookingTable = {
  shopId: string
  id: string
  machineId: string
  partyId: string | null
  fromAt: string
  toAt: string
  zone: string
  state: 'booked' | 'out' | 'back' | 'cancelled'
}
