'use client'
import { useState } from 'react'
import type { BookIndex } from '@/lib/diag/book-index'
import { meterInput } from '@/lib/diag/meter'
import type { Judged } from '@/lib/diag/spec-of'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { JobCase } from '../engine/use-case'
import { Key } from '../ui/key'
import { MeterFitnessView } from './meter-fitness'
import { setupWords, useMeterSetup } from './meter-setup'
import { MeterSetupForm } from './meter-setup-form'

type Props = { jobId: Id; check: CheckItem; index: BookIndex; found: JobCase; judged: Judged }

/** The meter in hand, how it is set up, and whether it can decide this figure at all: before the panel comes off. */
export function MeterBefore({ jobId, check, index, found, judged }: Props) {
  const view = useMeterSetup(jobId)
  const [open, setOpen] = useState(false)
  const quantity = check.reading?.quantity
  if (quantity === undefined) return null
  const input = meterInput(view.meter, view.setup, { quantity, spec: judged.value })
  return (
    <div className="grid gap-3">
      {input === null ? (
        <p className="font-bold">
          {view.ready ? 'No meter here reads this quantity.' : 'Looking for the meter.'}
        </p>
      ) : (
        <MeterFitnessView jobId={jobId} check={check} index={index} input={input} />
      )}
      <p className="text-second">{setupWords(view, quantity)}</p>
      {open && <MeterSetupForm view={view} quantity={quantity} airTempC={found.job.airTempC} />}
      <Key small aria-expanded={open} onClick={() => setOpen(!open)}>
        {open ? 'Meter is set up' : 'Change the meter set-up'}
      </Key>
    </div>
  )
}
