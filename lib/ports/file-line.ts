import { fail, ok, type Result } from '@/lib/model/result'

/** Why a file was not taken: the kind of the refusal, and the shop's own sentence for it when it gave one. */
export type FileRefusal = { kind: string; title: string | null }

/** The desk's line for handing a whole file to the shop. */
export type FileLine = {
  post(path: string, file: Blob): Promise<Result<unknown, FileRefusal>>
}

/** The line of a browser. An answer that is not ours is `serverTrouble`. */
export const browserFileLine: FileLine = {
  async post(path, file) {
    let answer: Response
    try {
      answer = await fetch(path, { method: 'POST', body: file, cache: 'no-store' })
    } catch {
      return fail({ kind: 'noConnection', title: null })
    }
    const json = (await answer.json().catch(() => null)) as Record<string, unknown> | null
    if (json === null) return fail({ kind: 'serverTrouble', title: null })
    if (answer.ok) return ok(json)
    const { kind, title } = json
    return fail({
      kind: typeof kind === 'string' ? kind : 'serverTrouble',
      title: typeof title === 'string' ? title : null,
    })
  },
}
