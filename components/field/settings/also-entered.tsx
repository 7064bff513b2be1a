'use client'

import { NotSaved, useSave } from '@/components/checks/use-save'
import { usePeople } from '@/components/store/use-rows'
import { announce } from '@/components/ui/announce'
import { Key } from '@/components/ui/key'
import type { Job } from '@/lib/model/job'
import type { MachineRow } from '@/lib/model/machine'
import {
  type AlsoEntered,
  type JobSetting,
  jobSetting,
  type MachineSetting,
  machineSetting,
} from '@/lib/model/setting'
import type { OpInput } from '@/lib/sync/protocol/op'
import { clockTime, dayOf } from '../times'
import { settingName, settingWords } from './setting-words'

type Shown = { one: AlsoEntered; setting: JobSetting | MachineSetting; ops: [OpInput, OpInput] }

type JobProps = { job: Job; mayUse: boolean }

/** Values of a job that somebody else entered without knowing of the one that stands (M4). */
export function AlsoEnteredOfJob({ job, mayUse }: JobProps) {
  const shown = (job.alsoEntered ?? []).flatMap((one): Shown[] => {
    const read = jobSetting.safeParse({ field: one.field, value: one.value })
    if (!read.success) return []
    const jobId = job.id
    return [
      {
        one,
        setting: read.data,
        ops: [
          { kind: 'job.set', jobId, fields: read.data },
          { kind: 'job.settle', jobId, fields: { history: [one.id] } },
        ],
      },
    ]
  })
  return <AlsoEnteredList shown={shown} zone={job.zone} mayUse={mayUse} />
}

type MachineProps = { machine: MachineRow; zone: string; mayUse: boolean }

/** The same of a machine. */
export function AlsoEnteredOfMachine({ machine, zone, mayUse }: MachineProps) {
  const shown = (machine.alsoEntered ?? []).flatMap((one): Shown[] => {
    const read = machineSetting.safeParse({ field: one.field, value: one.value })
    if (!read.success) return []
    // A merged machine shows what stands for it; what is settled is of that one.
    const machineId = machine.mergedInto ?? machine.id
    return [
      {
        one,
        setting: read.data,
        ops: [
          { kind: 'machine.set', machineId, fields: read.data },
          { kind: 'machine.settle', machineId, fields: { history: [one.id] } },
        ],
      },
    ]
  })
  return <AlsoEnteredList shown={shown} zone={zone} mayUse={mayUse} />
}

type ListProps = { shown: readonly Shown[]; zone: string; mayUse: boolean }

function AlsoEnteredList({ shown, zone, mayUse }: ListProps) {
  const { save, saving, problem } = useSave()
  if (shown.length === 0) return null
  const settle = async (ops: OpInput[], words: string) => {
    if (await save(ops)) announce(words)
  }
  return (
    <ul className="grid gap-3">
      {shown.map(({ one, setting, ops }) => {
        const words = settingWords(setting)
        return (
          <li key={one.id} className="grid gap-2 border-l-4 border-ink pl-3">
            <p>
              <b>
                {settingName(setting)} also entered: {words}
              </b>{' '}
              <Entered one={one} zone={zone} />
            </p>
            {mayUse ? (
              <div className="flex flex-wrap gap-2">
                <Key
                  small
                  disabled={saving}
                  aria-label={`Use it: ${settingName(setting)} ${words}`}
                  onClick={() => void settle(ops, `${settingName(setting)}: ${words}.`)}
                >
                  Use it
                </Key>
                <Key
                  small
                  quiet
                  disabled={saving}
                  aria-label={`Leave it: ${settingName(setting)} ${words}`}
                  onClick={() => void settle(ops.slice(1), 'Left as it stands.')}
                >
                  Leave it
                </Key>
              </div>
            ) : null}
          </li>
        )
      })}
      {problem === null ? null : (
        <li>
          <NotSaved problem={problem} />
        </li>
      )}
    </ul>
  )
}

function Entered({ one, zone }: { one: AlsoEntered; zone: string }) {
  const who = usePeople()?.find((person) => person.id === one.by)?.name
  const when = `${dayOf(one.at, zone)} at ${clockTime(one.at, zone)}`
  return (
    <span className="text-second text-ink2">
      by {who ?? 'somebody else'}, {when}.
      {one.clockOdd ? ' The clock of that phone was wrong, so the time may be too.' : ''}
    </span>
  )
}
