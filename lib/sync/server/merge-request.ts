import * as z from 'zod/mini'
import { type MergeEntity, mergeRows, unmergeRow } from '@/db/queries/merges'
import { id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, type Result } from '@/lib/model/result'
import { systemClock } from '@/lib/ports/clock'
import { uuidv7 } from '@/lib/ports/ids'
import { type MergeProblem, mayMerge } from '@/lib/shop/merge-rules'
import { answered, jsonAnswer } from './answer'
import { type HttpProblem, problemAnswer } from './problems'
import { readForm } from './read-form'

/** What the merge routes were given: who asks, and the row of the address. */
export type MergeAsk = {
  actor: Result<Actor, { kind: 'signIn' | 'forbidden' }>
  entity: MergeEntity
  named: string
}

const body = z.object({ into: id })
type Refused = Result<null, MergeProblem | { kind: 'notFound' }>

const stamp = () => ({ newId: uuidv7.next, at: new Date(systemClock.now()).toISOString() })

/** A merge asked for over the line: 200 when done, 409 when the two do not stand so. */
export function takeMerge(request: Request, { actor, entity, named }: MergeAsk): Promise<Response> {
  return answered(async () => {
    if (!actor.ok) return problemAnswer(actor.problem)
    const asked = await readForm(request, {}, body)
    if (!asked.ok) return problemAnswer(asked.problem)
    const row = id.safeParse(named)
    if (!row.success) return problemAnswer({ kind: 'notFound' })
    const input = { entity, id: row.data, intoId: asked.value.into, stamp: stamp() }
    return told(await mergeRows(actor.value, input, mayMerge))
  })
}

/** The undoing of a merge, likewise. */
export function takeUnmerge({ actor, entity, named }: MergeAsk): Promise<Response> {
  return answered(async () => {
    if (!actor.ok) return problemAnswer(actor.problem)
    const row = id.safeParse(named)
    const nowhere: Refused = fail({ kind: 'notFound' })
    const notMerged = { kind: 'notMerged' as const }
    const input = { entity, id: row.data ?? '', stamp: stamp() }
    return told(row.success ? await unmergeRow(actor.value, input, notMerged) : nowhere)
  })
}

const PROBLEMS: Readonly<Record<MergeProblem['kind'] | 'notFound', HttpProblem['kind']>> = {
  notFound: 'notFound',
  sameRow: 'notAsItStands',
  alreadyMerged: 'notAsItStands',
  notMerged: 'notAsItStands',
  jobClosed: 'notAsItStands',
}

const told = (done: Refused): Response =>
  done.ok ? jsonAnswer({ done: true }) : problemAnswer({ kind: PROBLEMS[done.problem.kind] })
