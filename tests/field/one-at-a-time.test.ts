import { describe, expect, it } from 'vitest'
import { oneAtATime } from '@/components/checks/one-at-a-time'

describe('one at a time', () => {
  it('[P1] a second tap while the first is being kept records nothing', async () => {
    const once = oneAtATime('busy')
    let kept = 0
    let done: () => void = () => undefined
    const keeping = new Promise<void>((resolve) => {
      done = resolve
    })
    const keep = async () => {
      kept += 1
      await keeping
      return 'kept'
    }
    const first = once(keep)
    expect(await once(keep)).toBe('busy')
    done()
    expect(await first).toBe('kept')
    expect(kept).toBe(1)
    expect(await once(keep)).toBe('kept')
    expect(kept).toBe(2)
  })

  it('[P1] lets the next one through after a failure', async () => {
    const once = oneAtATime(false)
    await expect(once(() => Promise.reject(new Error('no room')))).rejects.toThrow('no room')
    expect(await once(() => Promise.resolve(true))).toBe(true)
  })
})
