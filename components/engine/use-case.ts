'use client'
import { useMemo } from 'react'
import { meterAtHand } from '@/lib/diag/meter'
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Machine } from '@/lib/model/machine'
import type { MachineModel, SpecSheet } from '@/lib/model/machine-model'
import { useLog } from '../store/use-log'
import { useBag, useJob, useMachines, useMeters, useModels } from '../store/use-rows'
import { specForEngine } from './spec-kept'
import type { CaseInput } from './work'

export type JobCase = {
  job: Job
  machine: Machine | null
  model: MachineModel | null
  spec: SpecSheet | null
  entries: readonly LogEntry[]
  input: CaseInput
}

/** Everything the engine needs of one job; null while opening; that this phone does not hold it is said in front of every screen of a job. */
export function useCase(jobId: Id): JobCase | null {
  const job = useJob(jobId)
  const machines = useMachines()
  const models = useModels()
  const log = useLog(jobId)
  const meters = useMeters()
  const bag = useBag()
  return useMemo(() => {
    if (!job || log === undefined || machines === undefined || models === undefined) return null
    const machine = machines.find((row) => row.id === job.machineId) ?? null
    const model = models.find((row) => row.id === machine?.modelId) ?? null
    const meter = meterAtHand(meters, bag)
    const entries = log.map((stored) => stored.entry)
    const input: CaseInput = {
      features: { ...model?.features, ...machine?.features },
      spec: specForEngine(model?.specSheet ?? null),
      job: { complaint: job.complaint },
      entries,
      meter,
    }
    return { job, machine, model, spec: model?.specSheet ?? null, entries, input }
  }, [job, machines, models, log, meters, bag])
}
