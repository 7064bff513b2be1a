/** A check or swap whose outlook is wanted. Apart from work.ts, so that a page can name one without the engine. */
export type Action = { kind: 'check' | 'swap'; id: string }

/** Where an action's outlook stands in an answer. */
export const outlookKey = (action: Action): string => `${action.kind}:${action.id}`
