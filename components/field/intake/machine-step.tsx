'use client'

import { useMemo, useState } from 'react'
import { useMay } from '@/components/checks/use-may'
import { useMachines, useModels } from '@/components/store/use-rows'
import { Field } from '@/components/ui/field'
import { Key } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { Machine, MachineRow } from '@/lib/model/machine'
import type { MachineModel } from '@/lib/model/machine-model'
import { machineName } from '../words'
import type { StepProps } from './intake-draft'
import { StrangerForm } from './stranger-form'

/** Shown at once without a search; more come as the person types. */
const SHOWN = 8

/** Which machine: one of the fleet, or a stranger's. */
export function MachineStep({ draft, change }: StepProps) {
  const [wanted, setWanted] = useState('')
  const machines = useMachines()
  const models = useModels()
  const strangers = useMay('machine.add')
  const found = useMemo(() => search(machines ?? [], models, wanted), [machines, models, wanted])
  if (draft.stranger !== null) {
    return (
      <>
        <StrangerForm value={draft.stranger} onChange={(stranger) => change({ stranger })} />
        <Key small quiet onClick={() => change({ stranger: null })}>
          It is one of the fleet after all
        </Key>
      </>
    )
  }
  const picked = machines?.find((machine) => machine.id === draft.machineId)
  return (
    <>
      {strangers ? (
        <Key
          quiet
          onClick={() =>
            change({ machineId: null, stranger: { maker: '', model: '', year: '', features: {} } })
          }
        >
          A stranger’s machine
        </Key>
      ) : null}
      <RuleEdge end={String(found.length)}>The fleet</RuleEdge>
      <Field
        label="Unit number, maker or model"
        value={wanted}
        onChange={setWanted}
        type="search"
        inputMode="search"
        autoCapitalize="off"
      />
      <fieldset className="min-w-0">
        <legend className="visually-hidden">Machines of the fleet</legend>
        <div className="grid gap-2">
          {(picked && !found.includes(picked) ? [picked, ...found] : found)
            .slice(0, SHOWN)
            .map((machine) => (
              <MachineChoice
                key={machine.id}
                machine={machine}
                models={models}
                picked={machine.id === draft.machineId}
                onPick={() => change({ machineId: machine.id })}
              />
            ))}
        </div>
      </fieldset>
      {found.length > SHOWN ? (
        <p className="text-second text-ink2">
          {found.length - SHOWN} more: type to narrow it down.
        </p>
      ) : null}
      {found.length === 0 ? (
        <p>
          {machines?.length
            ? 'No unit of the fleet fits. Try fewer letters'
            : 'The fleet is not on this phone'}
          {strangers
            ? ', or take it down as a stranger’s machine.'
            : '. For any other machine call a mechanic or the shop: they open the job.'}
        </p>
      ) : null}
    </>
  )
}

function MachineChoice(props: {
  machine: Machine
  models: readonly MachineModel[] | undefined
  picked: boolean
  onPick: () => void
}) {
  const { machine, models, picked, onPick } = props
  const model = models?.find((m) => m.id === machine.modelId)
  return (
    <label className="choice">
      <input type="radio" name="machine" checked={picked} onChange={onPick} />
      <span className="caps shrink-0 text-key">{machine.unitNumber ?? '—'}</span>
      <span className="min-w-0">
        {machineName({ ...machine, unitNumber: null }, models)}
        <span className="block text-second font-normal">
          {model?.specSheet ? 'Spec sheet on this phone' : 'No spec sheet'}
        </span>
      </span>
    </label>
  )
}

function search(
  machines: readonly MachineRow[],
  models: readonly MachineModel[] | undefined,
  wanted: string,
): MachineRow[] {
  const words = wanted.toLowerCase().split(/\s+/).filter(Boolean)
  return machines
    .filter((machine) => machine.fleet && machine.mergedInto === undefined)
    .map((machine) => ({ machine, text: machineName(machine, models).toLowerCase() }))
    .filter(({ text }) => words.every((word) => text.includes(word)))
    .sort((a, b) => a.text.localeCompare(b.text, 'en', { numeric: true }))
    .map(({ machine }) => machine)
}
