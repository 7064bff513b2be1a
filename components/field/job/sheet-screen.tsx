'use client'

import { useBook } from '@/components/store/use-book'
import { Caution } from '@/components/ui/caution'
import { Figure } from '@/components/ui/figure'
import { Pins } from '@/components/ui/pins'
import { RuleEdge } from '@/components/ui/rule-edge'
import { Screen } from '@/components/ui/screen'
import type { SpecSheet, SpecValue } from '@/lib/model/machine-model'
import { OfJob } from '../of-job'

type Component = SpecSheet['components'][number]

/** The spec sheet of the job's machine: where things are, their pins and figures, each with its source. */
export function SheetScreen({ jobId }: { jobId: string }) {
  return (
    <OfJob jobId={jobId}>
      {({ model, machineName, machine }) => (
        <Screen title="Spec sheet" second={machineName}>
          {machine?.serial ? <p>Serial {machine.serial}</p> : null}
          {model?.specSheet ? (
            <Sheet sheet={model.specSheet} source={model.source} />
          ) : (
            <p>
              There is no spec sheet for this machine. Use the maker’s manual; figures shown in
              checks are then common practice and say so.
            </p>
          )}
        </Screen>
      )}
    </OfJob>
  )
}

function Sheet({ sheet, source }: { sheet: SpecSheet; source: string }) {
  const facts = [
    sheet.cutOut === null
      ? null
      : `Safety cut-out ${sheet.cutOut === 'opensToStop' ? 'opens' : 'closes'} to stop the engine.`,
    sheet.engagementRpm === null ? null : `Engagement speed ${sheet.engagementRpm} rpm.`,
    sheet.massKg === null ? null : `Mass ${sheet.massKg} kg.`,
    sheet.towPreparation === null ? null : `Before towing: ${sheet.towPreparation}`,
  ].filter((line) => line !== null)
  return (
    <>
      {sheet.demo ? (
        <Caution signal="NOTICE">
          An invented machine for the demonstration. Figures are invented.
        </Caution>
      ) : null}
      {facts.map((line) => (
        <p key={line}>{line}</p>
      ))}
      <section>
        <RuleEdge end={String(sheet.components.length)}>Components</RuleEdge>
        {sheet.components.map((component) => (
          <ComponentPart key={component.id} component={component} />
        ))}
      </section>
      <p className="text-second text-ink2">Sheet from: {source}</p>
    </>
  )
}

function ComponentPart({ component }: { component: Component }) {
  const { index } = useBook()
  const setups = component.setups.map((id) => index?.setups.get(id)?.name ?? id)
  return (
    <details className="border-b-2 border-ink">
      <summary className="fold">{component.name}</summary>
      <div className="grid gap-2 pb-4">
        <p>{component.place}</p>
        {setups.length > 0 ? <p>Take off first: {setups.join(', ')}.</p> : null}
        {component.fasteners ? <p>{component.fasteners}</p> : null}
        {component.connector ? <p>Connector: {component.connector}</p> : null}
        {component.torqueNm === null ? null : (
          <p>
            Torque <Figure value={component.torqueNm} unit="N m" />
          </p>
        )}
        {component.pins.length > 0 ? <Pins pins={component.pins} /> : null}
        {component.values.map((value) => (
          <Value key={value.id} value={value} />
        ))}
        <p className="text-second text-ink2">From: {component.source}</p>
      </div>
    </details>
  )
}

function Value({ value }: { value: SpecValue }) {
  return (
    <div className="border-b-[1.5px] border-rule pb-2">
      <p className="font-bold">{value.name}</p>
      <p>
        <Figure value={valueWords(value)} unit={value.unit} size="row" />
      </p>
      <p className="text-second text-ink2">
        {[
          value.conditions,
          value.partTempC === null ? null : `part at ${value.partTempC} °C`,
          `from: ${value.source}`,
        ]
          .filter(Boolean)
          .join('; ')}
      </p>
    </div>
  )
}

/** Limits win over nominal and tolerance, as they do in every verdict. */
function valueWords({ low, high, nominal, tolerancePercent }: SpecValue): string {
  if (low !== null && high !== null) {
    return `${low} to ${high}`
  }
  if (low !== null || high !== null) {
    return low === null ? `at most ${high}` : `at least ${low}`
  }
  return tolerancePercent === null ? String(nominal ?? '—') : `${nominal} ± ${tolerancePercent} %`
}
