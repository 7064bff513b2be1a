import { Caution, type SignalWord } from './caution'

type Step = { text: string; caution?: { signal: SignalWord; text: string } | null }

/** Numbered steps in large type, each with its own caution before it. */
export function Steps({ steps }: { steps: readonly Step[] }) {
  return (
    <ol className="grid gap-4">
      {steps.map((step, i) => (
        <li key={step.text} className="flex gap-3">
          <span aria-hidden="true" className="figures w-8 shrink-0 text-screen">
            {i + 1}
          </span>
          <div className="grid min-w-0 flex-1 gap-2 pt-1 text-row">
            {step.caution ? (
              <Caution signal={step.caution.signal}>{step.caution.text}</Caution>
            ) : null}
            <p>{step.text}</p>
          </div>
        </li>
      ))}
    </ol>
  )
}
