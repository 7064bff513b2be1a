import { kindName } from '@/components/log/entry-words'
import { opTitle, refusalWords } from '@/lib/sync/client/unsent'
import type { ImportAnswer, ImportOutcome } from '@/lib/sync/protocol/unsent-file'

type Listed = ImportAnswer['ops'][number]

/** What a record of the file is, in the words the phone uses for it. */
export function listedTitle(op: Pick<Listed, 'kind' | 'entry'>): string {
  const log = op.entry === null ? undefined : kindName(op.entry)
  return log ?? opTitle(op.kind) ?? 'Something this desk does not know'
}

const OUTCOMES: Record<ImportOutcome, string> = {
  new: 'New to the shop',
  taken: 'Taken in',
  quarantined: 'Set aside for the owner’s word',
  already: 'The shop has it already',
  refused: 'Refused',
  blocked: 'Waits for a record the shop does not have',
  later: 'Not now: bring the file again later',
}

/** What became of it, with the reason of a refusal. */
export function outcomeWords(of: Pick<Listed, 'outcome' | 'code'>): string {
  if (of.outcome !== 'refused') return OUTCOMES[of.outcome]
  if (of.code === 'letGo') return 'Let go by the person who made it: shown, not taken'
  return `Refused: ${refusalWords(of.code)}`
}

/** "3 taken in, 1 the shop had already, 1 refused." */
export function summaryOf(answer: ImportAnswer): string {
  const all = [...answer.ops, ...answer.photos]
  const count = (outcome: ImportOutcome) => all.filter((one) => one.outcome === outcome).length
  const parts = [
    [count('new'), 'new to the shop'],
    [count('taken'), 'taken in'],
    [count('quarantined'), 'set aside for the owner’s word'],
    [count('already'), 'here already'],
    [count('refused'), 'refused'],
    [count('blocked') + count('later'), 'waiting'],
  ] as const
  const said = parts.filter(([many]) => many > 0).map(([many, words]) => `${many} ${words}`)
  return said.length === 0 ? 'Nothing is in it.' : `${said.join(', ')}.`
}
