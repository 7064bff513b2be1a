import { afterEach, describe, expect, test, vi } from 'vitest'
import { inProcessLock, webLock } from '@/lib/ports/lock'

type Asked = { signal?: AbortSignal; steal?: boolean }
type Entry = { run: () => void; cancelled: boolean }

/** Web Locks of one name, as far as we use them: one holder, a queue, a signal to leave it, stealing. */
function fakeLocks() {
  const queue: Entry[] = []
  let holders = 0
  let robbed: (() => void) | null = null
  const next = () => {
    const entry = queue.shift()
    if (entry === undefined) return
    if (entry.cancelled) next()
    else entry.run()
  }
  const hold = (work: () => Promise<void>) => {
    holders += 1
    return new Promise<void>((resolve, reject) => {
      robbed = () => reject(new DOMException('stolen', 'AbortError'))
      work()
        .then(resolve, reject)
        .finally(() => {
          holders -= 1
          if (holders === 0) next()
        })
    })
  }
  return {
    request: (_name: string, options: Asked, work: () => Promise<void>) => {
      if (options.steal === true) {
        robbed?.()
        return hold(work)
      }
      if (holders === 0) return hold(work)
      return new Promise<void>((resolve, reject) => {
        const entry = { cancelled: false, run: () => resolve(hold(work)) }
        queue.push(entry)
        options.signal?.addEventListener('abort', () => {
          entry.cancelled = true
          reject(new DOMException('left', 'AbortError'))
        })
      })
    },
  }
}

/** A timer that the test rings. */
function bell() {
  const set: (() => void)[] = []
  return {
    after: (_ms: number, run: () => void) => {
      set.push(run)
      return () => undefined
    },
    ring: () => {
      for (const run of set.splice(0)) run()
    },
  }
}

const turn = () => new Promise((resolve) => setImmediate(resolve))
const never = () => Promise.resolve(false)

afterEach(() => vi.unstubAllGlobals())

describe('[P19] the lock of the sender', () => {
  test('within a process one runs after the other, also after one that failed', async () => {
    const lock = inProcessLock()
    const order: string[] = []
    const first = lock.run('a', () => Promise.reject(new Error('first')), never)
    const second = lock.run('a', async () => void order.push('second'), never)
    const other = lock.run('b', async () => void order.push('other'), never)
    await expect(first).rejects.toThrow('first')
    await Promise.all([second, other])
    expect(order.sort()).toEqual(['other', 'second'])
  })

  test('a waiting tab takes over from a holder that no longer moves, and only then', async () => {
    vi.stubGlobal('navigator', { locks: fakeLocks() })
    const timer = bell()
    const lock = webLock(timer)
    let isStale = false
    const frozen = lock.run('sync', () => new Promise(() => undefined), never)
    const lost = expect(frozen).rejects.toMatchObject({ kind: 'turnTaken' })
    let ran = 0
    const waiting = lock.run(
      'sync',
      () => {
        ran += 1
        return Promise.resolve()
      },
      () => Promise.resolve(isStale),
    )
    timer.ring()
    await turn()
    expect(ran).toBe(0)
    isStale = true
    timer.ring()
    await waiting
    expect(ran).toBe(1)
    await lost
  })

  test('a failure of the work reaches the caller and is not taken for a lost lock', async () => {
    vi.stubGlobal('navigator', { locks: fakeLocks() })
    const lock = webLock(bell())
    await expect(lock.run('sync', () => Promise.reject(new Error('mine')), never)).rejects.toThrow(
      'mine',
    )
  })
})
