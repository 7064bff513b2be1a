import * as z from 'zod/mini'
import { asShop, type ShopTx } from '@/db/client'
import { emailsOfRole } from '@/db/queries/contacts'
import { findJob } from '@/db/queries/jobs'
import { listModels, machinesById } from '@/db/queries/machines'
import { findPartRequest } from '@/db/queries/part-requests'
import { peopleById } from '@/db/queries/people'
import { getShop } from '@/db/queries/shop'
import { id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import { machineWords } from '@/lib/model/machine'
import type { PartLine, PartRequestRow } from '@/lib/model/part-request'
import type { Letter, Mail } from '@/lib/ports/mail'
import {
  aftermarketWords,
  breakEvenWords,
  CHOICE_WORDS,
  URGENCY_WORDS,
} from '@/lib/shop/part-words'

/**
 * partRequestMail: a request from the field has arrived, so the shop's parts people are told by one
 * letter (the owner where nobody has that role). The queue runs it at least once and keeps one per
 * request by its key; the letter's id is the request's, so a second copy is known as such.
 */
const payload = z.object({ shopId: id, requestId: id })

/** Writes and sends the letter; does nothing for a request that is gone or when nobody has an address. */
export async function partRequestMail(
  given: unknown,
  { mail, address }: { mail: Mail; address: string },
): Promise<void> {
  const { shopId, requestId } = payload.parse(given)
  const letter = await asShop(shopId, (tx) => letterFor(tx, requestId, address))
  if (letter) await mail.send(letter)
}

async function letterFor(tx: ShopTx, requestId: string, address: string): Promise<Letter | null> {
  const request = await findPartRequest(tx, requestId)
  const job = request ? await findJob(tx, request.jobId) : undefined
  const parts = await emailsOfRole(tx, 'parts')
  const to = parts.length > 0 ? parts : await emailsOfRole(tx, 'owner')
  if (!request || !job || to.length === 0) return null
  const [askedBy] = await peopleById(tx, [request.askedBy])
  const { name } = await getShop(tx)
  const needed = URGENCY_WORDS[request.urgency].toLowerCase()
  const first = request.lines[0]?.words ?? ''
  const more = request.lines.length > 1 ? ` and ${request.lines.length - 1} more` : ''
  const text = [
    `${askedBy?.name ?? 'Somebody in the field'} asks for parts on job ${job.number ?? ''}, needed ${needed}.`,
    '',
    `Machine: ${await nameOfMachine(tx, job)}`,
    `Complaint: ${job.complaint.words}`,
    '',
    ...request.lines.map(lineWords),
    ...(request.note === null ? [] : ['', `Note: ${request.note}`]),
    ...adviceWords(request),
    '',
    `Open the parts desk: ${address}/desk/parts`,
    '',
    name,
  ].join('\n')
  const subject = oneLine(`${job.number ?? 'Job'}: ${first}${more}, needed ${needed}`)
  return { id: request.id, to, subject, text }
}

/** A head field has one line. */
const oneLine = (text: string): string => text.replace(/\s+/g, ' ').trim()

async function nameOfMachine(tx: ShopTx, { machineId }: Job): Promise<string> {
  const [machine] = await machinesById(tx, [machineId])
  const [model] = machine?.modelId ? await listModels(tx, [machine.modelId]) : []
  return machineWords({ ...machine, ...model })
}

function lineWords(line: PartLine): string {
  const number = line.number === null ? '' : `, number ${line.number}`
  const position = line.position === null ? '' : `, ${line.position}`
  return `  ${line.quantity} x ${line.words} (${CHOICE_WORDS[line.choice].toLowerCase()}${number}${position})`
}

/** The sum that was shown in the field: from which failure chance on the cheaper part is not worth it. */
function adviceWords({ advice }: PartRequestRow): string[] {
  if (advice === null) return []
  return [
    '',
    `Worked out in the field. ${breakEvenWords(advice.breakEven)} ${aftermarketWords(advice.aftermarketFails)}`,
  ]
}
