import { v7 } from 'uuid'
import type { JobOpening } from '@/lib/model/job'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import type { Machine } from '@/lib/model/machine'
import type { PartRequest } from '@/lib/model/part-request'
import type { OpInput } from '@/lib/sync/protocol/op'
import type { RawDevice } from './raw-device'

/** Invented records as a phone would write them. Every one can be changed by the last argument. */
type Input<K extends OpInput['kind']> = Extract<OpInput, { kind: K }>

export const machineAdd = (changes: Partial<Machine> = {}): Input<'machine.add'> => ({
  kind: 'machine.add',
  fields: {
    id: v7(),
    modelId: null,
    unitNumber: null,
    makerTyped: 'Tarnholt',
    modelTyped: 'Moor 450',
    year: 2021,
    serial: null,
    hours: 412.5,
    features: { kind: 'atv', strokes: 'four' },
    fleet: false,
    ...changes,
  },
})

export const jobOpen = (
  machineId: string,
  changes: Partial<JobOpening> = {},
): Input<'job.open'> => ({
  kind: 'job.open',
  fields: {
    id: v7(),
    machineId,
    people: { count: 1, hurt: false, missing: false, exposed: false },
    place: null,
    complaint: { words: 'Starts, runs a moment, dies', symptom: 'startsThenDies', lampOn: true },
    before: ['water'],
    airTempC: -4,
    weather: null,
    openedAt: '2026-11-24T18:40:00.000Z',
    zone: 'Etc/GMT+6',
    ...changes,
  },
})

export const logAdd = (
  device: RawDevice,
  jobId: string,
  body: LogBody,
  changes: Partial<LogEntry> = {},
): Input<'log.add'> => ({
  kind: 'log.add',
  fields: {
    id: v7(),
    jobId,
    supersedes: null,
    happenedAt: device.now(),
    writtenAt: device.now(),
    zone: 'Etc/GMT+6',
    authorId: device.owner.personId,
    deviceId: device.id,
    engineVersion: '1',
    bookVersion: 1,
    body,
    ...changes,
  },
})

export const note = (words: string): LogBody => ({ kind: 'note', words })

export const partRequestAsk = (
  jobId: string,
  changes: Partial<PartRequest> = {},
): Input<'partRequest.ask'> => ({
  kind: 'partRequest.ask',
  fields: {
    id: v7(),
    jobId,
    askedAt: '2026-11-24T19:10:00.000Z',
    urgency: 'today',
    note: null,
    lines: [
      {
        id: v7(),
        part: 'ignitionCoil',
        words: 'Ignition coil',
        position: null,
        quantity: 1,
        choice: 'genuine',
        number: null,
        price: { minor: 13_500, currency: 'USD' },
        condemnedBy: null,
      },
    ],
    advice: null,
    ...changes,
  },
})

export const adviceKeep = (jobId: string, inputs: unknown = {}): Input<'advice.keep'> => ({
  kind: 'advice.keep',
  fields: {
    id: v7(),
    jobId,
    at: '2026-11-24T18:55:00.000Z',
    engineVersion: '1',
    bookVersion: 1,
    inputs,
    shown: { next: 'coilSwap' },
    acted: 'overridden',
    chose: 'coilPrimaryResistance',
    reason: 'Meter was in hand',
  },
})
