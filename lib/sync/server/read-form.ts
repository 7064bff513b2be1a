import type * as z from 'zod/mini'
import { fail, ok, type Result } from '@/lib/model/result'
import { readCapped, readJson } from './body'
import type { HttpProblem } from './problems'

/** Most bytes of a form of the desk. */
const MAX_BYTES = 8 * 1024

/** The JSON of a form, with what the address says of it (`also`), in the shape asked for; else `badJson`. */
export async function readForm<T>(
  request: Request,
  also: Record<string, unknown>,
  schema: z.ZodMiniType<T>,
): Promise<Result<T, HttpProblem>> {
  const body = await readCapped(request, MAX_BYTES)
  if (!body.ok) return body
  const json = await readJson(body.value, null)
  if (!json.ok) return json
  const { value } = json
  const isObject = typeof value === 'object' && value !== null
  const form = schema.safeParse(isObject ? { ...(value as object), ...also } : null)
  return form.success ? ok(form.data) : fail({ kind: 'badJson' })
}
