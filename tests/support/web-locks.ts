type Held = { release: (stolen: boolean) => void }
type Asked = { grant: () => void; signal: AbortSignal | undefined }

/**
 * Web Locks as a browser has them, as far as our lock uses them (W3C Web Locks API): exclusive locks in
 * order of asking, `signal` to give up waiting, `steal` to take from the holder, whose request is then
 * rejected while its work goes on.
 */
export class TestLocks {
  readonly #held = new Map<string, Held>()
  readonly #queues = new Map<string, Asked[]>()

  request(
    name: string,
    options: { signal?: AbortSignal; steal?: boolean },
    work: (lock: unknown) => Promise<void>,
  ): Promise<void> {
    return new Promise((resolve, reject) => {
      const grant = () => {
        let over = false
        const held: Held = {
          release: (stolen) => {
            if (over) return
            over = true
            if (this.#held.get(name) === held) this.#held.delete(name)
            if (stolen) reject(new DOMException('Lock broken by another request', 'AbortError'))
          },
        }
        this.#held.set(name, held)
        const end = (settle: () => void) => () => {
          if (over) return
          held.release(false)
          settle()
          this.#next(name)
        }
        Promise.resolve()
          .then(() => work({ name }))
          .then(end(resolve), (cause: unknown) => end(() => reject(cause))())
      }
      if (options.steal === true) {
        this.#held.get(name)?.release(true)
        grant()
        return
      }
      if (!this.#held.has(name)) {
        grant()
        return
      }
      const asked = { grant, signal: options.signal }
      this.#queues.set(name, [...(this.#queues.get(name) ?? []), asked])
      options.signal?.addEventListener('abort', () => {
        const queue = this.#queues.get(name) ?? []
        if (!queue.includes(asked)) return
        this.#queues.set(
          name,
          queue.filter((one) => one !== asked),
        )
        reject(new DOMException('The request was aborted', 'AbortError'))
      })
    })
  }

  #next(name: string): void {
    const queue = this.#queues.get(name) ?? []
    const [first, ...rest] = queue
    this.#queues.set(name, rest)
    first?.grant()
  }
}
