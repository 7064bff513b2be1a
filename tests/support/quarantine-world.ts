import { POST as postDecide } from '@/app/api/desk/phones/[id]/decide/route'
import { POST as postRevoke } from '@/app/api/desk/phones/[id]/revoke/route'
import { GET as getPhones } from '@/app/api/desk/phones/route'
import { type DecidedAnswer, type DeskPhone, decidedAnswer, deskPhones } from '@/lib/model/phones'

/** What the owner does at the desk with phones, through the real routes. */
export type OwnersDesk = {
  phones(): Promise<DeskPhone[]>
  phone(id: string): Promise<DeskPhone>
  revoke(id: string, reason?: string): Promise<Response>
  decide(id: string, form: Record<string, unknown>): Promise<Response>
  decided(id: string, form: Record<string, unknown>): Promise<DecidedAnswer['decided']>
}

const at = (path: string, cookie: string, form?: Record<string, unknown>) =>
  new Request(`http://shop.invalid/api/desk/phones${path}`, {
    method: form === undefined ? 'GET' : 'POST',
    headers: { cookie },
    ...(form === undefined ? {} : { body: JSON.stringify(form) }),
  })

/** The desk of whoever has this cookie. */
export function deskOf(cookie: string): OwnersDesk {
  const params = (id: string) => ({ params: Promise.resolve({ id }) })
  const desk: OwnersDesk = {
    async phones() {
      const answer = await getPhones(at('', cookie))
      if (answer.status !== 200) throw new Error(`phones: ${answer.status}`)
      return deskPhones.parse(await answer.json()).phones
    },
    async phone(id) {
      const found = (await desk.phones()).find((phone) => phone.id === id)
      if (!found) throw new Error('no such phone in the list')
      return found
    },
    revoke: (id, reason = 'Lost on the trail') =>
      postRevoke(at(`/${id}/revoke`, cookie, { reason }), params(id)),
    decide: (id, form) => postDecide(at(`/${id}/decide`, cookie, form), params(id)),
    async decided(id, form) {
      const answer = await desk.decide(id, form)
      if (answer.status !== 200) throw new Error(`decide: ${answer.status}`)
      return decidedAnswer.parse(await answer.json()).decided
    },
  }
  return desk
}
