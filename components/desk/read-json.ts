import { AppError } from '@/lib/model/result'
import type { ShopLine } from '@/lib/ports/shop-line'

type Parser<T> = { parse(value: unknown): T }

/** One read of the shop, parsed at the border; a refusal is thrown with its kind for the screen to say. */
export async function read<T>(line: ShopLine, path: string, parser: Parser<T>): Promise<T> {
  const answer = await line.getJson(path)
  if (!answer.ok) {
    const { kind } = answer.problem
    throw new AppError(kind, { retry: kind === 'noConnection' || kind === 'serverTrouble' })
  }
  return parser.parse(answer.value)
}

/** Tries three more times when the line or the server is in trouble, never after a refusal. */
export const retryRead = (failures: number, error: Error) =>
  failures < 3 && error instanceof AppError && error.retry
