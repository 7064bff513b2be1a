'use client'

import { NotYours, useMay } from '@/components/checks/use-may'
import { useDraft } from '@/components/store/use-draft'
import { Field } from '@/components/ui/field'
import { Screen } from '@/components/ui/screen'
import type { Machine } from '@/lib/model/machine'
import { type MachineSetting, machineSetting } from '@/lib/model/setting'
import type { OpInput } from '@/lib/sync/protocol/op'
import { typedNumber } from '../intake/intake-rules'
import { OfJob } from '../of-job'
import type { JobFacts } from '../use-job-facts'
import { usePatch } from '../use-patch'
import { type Refusal, SettingScreen } from './setting-screen'

type MachineDraft = Partial<Record<MachineSetting['field'], string>>
const EMPTY: MachineDraft = {}

/** Engine hours, unit and serial number and year of the job's machine. */
export function MachineScreen({ jobId }: { jobId: string }) {
  const mine = useMay('machine.add')
  if (!mine) {
    return (
      <Screen title="Machine">
        <NotYours what="Changing a machine" />
      </Screen>
    )
  }
  return (
    <OfJob jobId={jobId}>
      {(facts) =>
        facts.machine === null ? (
          <Screen title="Machine">
            <p>This machine is not on this phone.</p>
          </Screen>
        ) : (
          <MachineForm facts={facts} machine={facts.machine} />
        )
      }
    </OfJob>
  )
}

const shown = (machine: Machine, field: MachineSetting['field']): string =>
  machine[field] === null ? '' : String(machine[field])

function MachineForm({ facts, machine }: { facts: JobFacts; machine: Machine }) {
  const key = `machine.${machine.id}.values`
  const { value: draft, set, ready } = useDraft<MachineDraft>(key, EMPTY)
  const change = usePatch(draft, set)
  const text = (field: MachineSetting['field']) => draft[field] ?? shown(machine, field)
  return (
    <SettingScreen
      jobId={facts.job.id}
      title="Machine"
      second={facts.machineName}
      saveWords="Save machine"
      ready={ready}
      draftKey={key}
      read={() => readMachine(machine, draft)}
    >
      {(errorOf) => (
        <>
          <Field
            label="Engine hours"
            value={text('hours')}
            onChange={(hours) => change({ hours: hours.slice(0, 10) })}
            inputMode="decimal"
            figures
            error={errorOf('hours')}
          />
          <Field
            label="Unit number"
            value={text('unitNumber')}
            onChange={(unitNumber) => change({ unitNumber })}
            maxLength={20}
            figures
            error={errorOf('unitNumber')}
          />
          <Field
            label="Serial number, as on the machine"
            value={text('serial')}
            onChange={(serial) => change({ serial })}
            maxLength={30}
            autoCapitalize="characters"
            figures
            error={errorOf('serial')}
          />
          <Field
            label="Year"
            value={text('year')}
            onChange={(year) => change({ year: year.replace(/\D/g, '').slice(0, 4) })}
            inputMode="numeric"
            figures
            error={errorOf('year')}
          />
        </>
      )}
    </SettingScreen>
  )
}

const PROBLEMS: Record<MachineSetting['field'], string> = {
  hours: 'Engine hours: a number, or nothing.',
  unitNumber: 'The unit number has up to 20 characters.',
  serial: 'The serial number has up to 30 characters.',
  year: 'Year: four figures from 1950 on, or nothing.',
}

/** What changed of a machine, each value as an op of its own; the sentence for one that cannot be read. */
export function readMachine(machine: Machine, draft: MachineDraft): OpInput[] | Refusal {
  const ops: OpInput[] = []
  for (const field of ['hours', 'unitNumber', 'serial', 'year'] as const) {
    const text = draft[field]?.trim()
    if (text === undefined || text === shown(machine, field)) continue
    const read = machineSetting.safeParse({ field, value: typedValue(field, text) })
    if (!read.success) return { field, words: PROBLEMS[field] }
    ops.push({ kind: 'machine.set', machineId: machine.id, fields: read.data })
  }
  return ops
}

/** Nothing for an empty box; of a number that cannot be read, the text, which then is refused. */
function typedValue(field: MachineSetting['field'], text: string): string | number | null {
  if (text === '') return null
  return field === 'hours' || field === 'year' ? (typedNumber(text) ?? text) : text
}
