import { v7 } from 'uuid'
import type { PartLine } from '@/lib/model/part-request'
import type { Place } from '@/lib/model/place'
import type { JobSetting, MachineSetting } from '@/lib/model/setting'
import type { RawDevice } from './raw-device'

/** Invented places: an upland nobody lives on. */
export const placeAt = (latitude: number, words: string | null = null): Place => ({
  latitude,
  longitude: -93.2,
  source: 'typed',
  accuracyMetres: null,
  at: '2026-11-24T18:40:00.000Z',
  asTyped: null,
  words,
})

export const lineOf = (changes: Partial<PartLine> = {}): PartLine => ({
  id: v7(),
  part: 'sparkPlug',
  words: 'Spark plug',
  position: null,
  quantity: 2,
  choice: 'either',
  number: null,
  price: null,
  condemnedBy: null,
  ...changes,
})

/** Ops of schema 2 as a phone stamps them; `base` is the change number of the row it had. */
export const opsOf = (device: RawDevice) => ({
  setJob: (jobId: string, fields: JobSetting, base: number | null = null) => ({
    ...device.op({ kind: 'job.set', jobId, entityId: jobId, fields }),
    base,
  }),
  setMachine: (machineId: string, fields: MachineSetting, base: number | null = null) => ({
    ...device.op({ kind: 'machine.set', machineId, entityId: machineId, fields }),
    base,
  }),
  settle: (jobId: string, history: string[]) =>
    device.op({ kind: 'job.settle', jobId, entityId: jobId, fields: { history } }),
  addLine: (of: Asked, line: PartLine) =>
    device.op({
      kind: 'partLine.add',
      jobId: of.jobId,
      entityId: of.requestId,
      fields: { requestId: of.requestId, line },
    }),
  cancelLine: (of: Asked, lineId: string) =>
    device.op({
      kind: 'partLine.cancel',
      jobId: of.jobId,
      entityId: of.requestId,
      fields: { requestId: of.requestId, lineId },
    }),
  countLine: (of: Asked, lineId: string, by: number) =>
    device.op({
      kind: 'partLine.quantity',
      jobId: of.jobId,
      entityId: of.requestId,
      fields: { requestId: of.requestId, lineId, by },
    }),
  dropRequest: (of: Asked, base: number | null = null) => ({
    ...device.op({
      kind: 'partRequest.drop',
      jobId: of.jobId,
      requestId: of.requestId,
      entityId: of.requestId,
      fields: {},
    }),
    base,
  }),
  dropMachine: (machineId: string, base: number | null = null) => ({
    ...device.op({ kind: 'machine.drop', machineId, entityId: machineId, fields: {} }),
    base,
  }),
})

export type Asked = { jobId: string; requestId: string }
