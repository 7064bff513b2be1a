import { describe, expect, test } from 'vitest'
import { EMPTY_INTAKE, type IntakeDraft } from '@/components/field/intake/intake-draft'
import { missingFrom, typedNumber } from '@/components/field/intake/intake-rules'
import { opsOf } from '@/components/field/intake/open-job'
import type { Stamp } from '@/components/store/use-stamp'
import { jobOpening } from '@/lib/model/job'
import { logEntry } from '@/lib/model/log-entry'
import { machine } from '@/lib/model/machine'

const NOW = '2026-11-24T18:40:00.000Z'
const id = (n: number) => `01980000-0000-7000-8000-0000000009${String(n).padStart(2, '0')}`

function stamp(): Stamp {
  let next = 0
  const newId = () => {
    next += 1
    return id(next)
  }
  return {
    newId,
    now: () => NOW,
    zone: 'Etc/GMT+6',
    entry: (jobId, body, extra) => ({
      kind: 'log.add',
      fields: {
        id: newId(),
        jobId,
        supersedes: extra?.supersedes ?? null,
        happenedAt: extra?.happenedAt ?? NOW,
        writtenAt: NOW,
        zone: 'Etc/GMT+6',
        authorId: id(90),
        deviceId: id(91),
        engineVersion: '1',
        bookVersion: 1,
        body,
      },
    }),
  }
}
const open = (over: Partial<IntakeDraft>) =>
  opsOf(
    { ...EMPTY_INTAKE, ...over },
    { stamp: stamp(), symptomName: 'Starts, then dies', emergencyNumber: '112' },
  )

describe('[F1] a new job', () => {
  test('records the job and its symptom, in that order, in the shapes the shop takes', () => {
    const { jobId, ops } = open({
      machineId: id(50),
      symptom: 'startsThenDies',
      conditions: ['afterSeconds'],
      words: ' Dies after two seconds ',
      lamp: 'on',
      before: ['water'],
      air: '−15',
      placeWords: 'Marker 12',
      place: {
        latitude: 47.1,
        longitude: -93.2,
        source: 'fix',
        accuracyMetres: 12,
        at: NOW,
        asTyped: null,
        words: null,
      },
    })
    expect(ops.map((op) => op.kind)).toEqual(['job.open', 'log.add'])
    const [job, symptom] = ops.map((op) => op.fields)
    expect(jobOpening.parse(job)).toMatchObject({
      id: jobId,
      machineId: id(50),
      complaint: { words: 'Dies after two seconds', symptom: 'startsThenDies', lampOn: true },
      airTempC: -15,
      place: { words: 'Marker 12', accuracyMetres: 12 },
      people: { count: 1, hurt: false, missing: false, exposed: false },
    })
    expect(logEntry.parse(symptom)).toMatchObject({ jobId, body: { kind: 'symptom' } })
  })

  test("a stranger's machine comes before its job; the list's words stand in for the rider's", () => {
    const { ops } = open({
      symptom: 'startsThenDies',
      stranger: { maker: 'Brindle', model: '', year: '1890', features: { kind: 'atv' } },
    })
    expect(ops.map((op) => op.kind)).toEqual(['machine.add', 'job.open', 'log.add'])
    const added = machine.parse(ops[0]!.fields)
    const opening = jobOpening.parse(ops[1]!.fields)
    expect(added).toMatchObject({
      makerTyped: 'Brindle',
      modelTyped: null,
      year: null,
      fleet: false,
    })
    expect(opening.machineId).toBe(added.id)
    expect(opening.complaint).toMatchObject({ words: 'Starts, then dies', lampOn: null })
  })

  test('hurt or missing: the answer about emergency services goes into the log', () => {
    const { ops } = open({
      machineId: id(50),
      words: 'Rolled',
      dangers: ['hurt', 'exposed'],
      help: 'called',
    })
    const note = logEntry.parse(ops.at(-1)!.fields)
    expect(note.body).toEqual({
      kind: 'note',
      words:
        'People: somebody hurt. Shown: emergency services first (112). Answer: emergency services were called.',
    })
  })

  test.each([
    ['people', { dangers: ['missing'] }, true],
    ['people', { dangers: ['missing'], help: 'cannotCall' }, false],
    ['people', { dangers: ['exposed'] }, false],
    ['machine', {}, true],
    ['machine', { machineId: id(50) }, false],
    ['complaint', { words: '  ' }, true],
    ['complaint', { symptom: 'startsThenDies' }, false],
    ['place', {}, false],
    ['place', { air: '61' }, true],
    ['place', { air: 'cold' }, true],
    ['place', { placeText: '47.1 N' }, true],
  ] as const)('%s with %j stands in the way: %s', (step, over, stands) => {
    const draft = { ...EMPTY_INTAKE, ...over } as IntakeDraft
    expect(missingFrom(draft, step) !== null).toBe(stands)
  })

  test('numbers may have a comma and any minus', () => {
    expect(['-1,5', '−15', '7', '', '1.2.3', '1e3'].map(typedNumber)).toEqual([
      -1.5,
      -15,
      7,
      null,
      null,
      null,
    ])
  })
})
