/** What a function answers when failing is an expected outcome. */
export type Result<T, P> = { ok: true; value: T } | { ok: false; problem: P }

/** A success. */
export const ok = <T>(value: T): Result<T, never> => ({ ok: true, value })

/** A failure with its coded problem. */
export const fail = <P>(problem: P): Result<never, P> => ({ ok: false, problem })

/** Closes a switch over a union; the compiler refuses it while a member is missing. */
export function assertNever(value: never): never {
  throw new AppError('unreachable', { context: { value } })
}

/** A broken assumption. The sync loop reads only `retry`. */
export class AppError extends Error {
  readonly kind: string
  readonly retry: boolean
  readonly context: Record<string, unknown>
  constructor(
    kind: string,
    options: { retry?: boolean; context?: Record<string, unknown>; cause?: unknown } = {},
  ) {
    super(kind, options.cause === undefined ? undefined : { cause: options.cause })
    this.name = 'AppError'
    this.kind = kind
    this.retry = options.retry ?? false
    this.context = options.context ?? {}
  }
}
