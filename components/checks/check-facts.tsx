'use client'
import type { BookIndex } from '@/lib/diag/book-index'
import { wordName } from '@/lib/diag/book-index'
import type { CheckItem } from '@/lib/model/code-book'
import { useBag } from '../store/use-rows'
import { LIGHT_WORDS, MACHINE_STATE_WORDS, minutesWords } from './words'

/** What a check takes: minutes, tools (and which are not in the bag), people, machine, light, weather. */
export function CheckFacts({ check, index }: { check: CheckItem; index: BookIndex }) {
  const bag = useBag()
  const setups = check.setups.map((id) => index.setups.get(id)).filter((one) => one !== undefined)
  const missing = bag
    ? check.tools.filter(
        ({ tool }) => !bag.tools.includes(tool) && !bag.parts.some((p) => p.part === tool),
      )
    : []
  const name = (tool: string) => wordName(index, 'tool', tool)
  return (
    <dl className="grid grid-cols-[auto_minmax(0,1fr)] gap-x-4 gap-y-2 border-y-2 border-ink py-3">
      <Fact name="Time">
        <span className="figures">{minutesWords(check.minutes)}</span>
        {setups.length > 0 &&
          `, and ${setups.map((one) => `${one.name.toLowerCase()} ${minutesWords(one.minutes)}`).join(', ')}`}
      </Fact>
      <Fact name="Tools">
        {check.tools.length === 0
          ? 'None'
          : check.tools.map(({ tool, accuracy }) => (
              <span key={tool} className="block">
                {name(tool)}
                {accuracy === null ? '' : `. ${accuracy}`}
              </span>
            ))}
        {missing.length > 0 && (
          <b className="block">
            Not in your bag: {missing.map(({ tool }) => name(tool)).join(', ')}
          </b>
        )}
      </Fact>
      <Fact name="People">
        {check.people === 1 ? 'One' : 'Two'}
        {check.onePersonWay !== null && `. Alone: ${check.onePersonWay}`}
      </Fact>
      <Fact name="Machine">
        {MACHINE_STATE_WORDS[check.machineState]}
        {check.mayMoveMachine && '. It may move: chock it, nobody in front.'}
      </Fact>
      <Fact name="Light">{LIGHT_WORDS[check.light]}</Fact>
      {check.weather !== null && <Fact name="Weather">{check.weather}</Fact>}
    </dl>
  )
}

function Fact({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <>
      <dt className="text-second text-ink2">{name}</dt>
      <dd>{children}</dd>
    </>
  )
}
