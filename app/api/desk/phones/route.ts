import { readPhones } from '@/db/queries/phones'
import { allowedActor } from '@/lib/auth/allowed'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/** GET /api/desk/phones: the owner's list of phones, with what lies in quarantine. */
export async function GET(request: Request): Promise<Response> {
  const found = await allowedActor(request, 'device.revoke')
  if (!found.ok) return problemAnswer(found.problem)
  const phones = await readPhones(found.value.shopId)
  return Response.json(phones, { headers: { 'cache-control': 'no-store' } })
}

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
