'use client'

import { useMemo } from 'react'
import { useJob, useMachines, useModels } from '@/components/store/use-rows'
import type { Features } from '@/lib/model/features'
import type { Job } from '@/lib/model/job'
import type { MachineRow } from '@/lib/model/machine'
import type { MachineModel } from '@/lib/model/machine-model'
import { machineName } from './words'

/** A job with its machine and model; `gone` when this phone does not hold it, undefined while opening. */
export type JobFacts = {
  job: Job
  machine: MachineRow | null
  model: MachineModel | null
  /** Known features: the model's, overruled by what is known of this very machine. */
  features: Features
  machineName: string
}

export function useJobFacts(jobId: string): JobFacts | 'gone' | undefined {
  const job = useJob(jobId)
  const machines = useMachines()
  const models = useModels()
  return useMemo(() => {
    if (job === null) {
      return 'gone'
    }
    if (job === undefined || machines === undefined || models === undefined) {
      return undefined
    }
    const machine = machines.find((m) => m.id === job.machineId) ?? null
    const model = models.find((m) => m.id === machine?.modelId) ?? null
    return {
      job,
      machine,
      model,
      features: { ...model?.features, ...machine?.features },
      machineName: machineName(machine, models),
    }
  }, [job, machines, models])
}
