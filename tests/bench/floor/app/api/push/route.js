import { answer, ask, messageOf } from '../../floor.js'

/** A plain outbox's push: one statement, no checks. */
export async function POST(request) {
  const { message } = await messageOf(request)
  await ask(
    `insert into floor_record (shop_id, id, body)
      select $1, (r.value->>'id')::uuid, r.value from json_array_elements($2::json) r on conflict do nothing`,
    [message.shop, JSON.stringify(message.records)],
  )
  return answer({ taken: message.records.length })
}
