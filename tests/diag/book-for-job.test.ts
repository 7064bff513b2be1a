import { describe, expect, it } from 'vitest'
import { bookForJob, bookOfJob } from '@/lib/diag/book-for-job'

const written = (...versions: (number | null)[]) => versions.map((bookVersion) => ({ bookVersion }))
const none = { newerSeen: null, missing: null, newest: null }

describe('[R23] [CB38] the code book a job is worked out with', () => {
  it('[CB38] is the one it holds, until an entry with a newer one moves it', () => {
    expect(bookForJob([1, 2], written(1, null, 1))).toEqual({ ...none, version: 1, newest: 2 })
    expect(bookForJob([3, 1, 2], written(1, 2))).toEqual({ ...none, version: 2, newest: 3 })
    expect(bookForJob([2, 1], written(2, null))).toEqual({ ...none, version: 2 })
    expect(bookOfJob(written(1, 3, 2, null))).toBe(3)
  })

  it('[CB38] is the newest at hand while no entry says one', () => {
    expect(bookForJob([1, 2], [])).toEqual({ ...none, version: 2 })
    expect(bookForJob([], written(null))).toEqual({ ...none, version: null })
  })

  it('[CB38] is the next newer one at hand when its own is not, and says so', () => {
    expect(bookForJob([2, 4, 3], written(1))).toEqual({
      ...none,
      version: 2,
      missing: 1,
      newest: 4,
    })
    expect(bookForJob([1], written(1, 2))).toEqual({
      version: 1,
      newerSeen: 2,
      missing: 2,
      newest: null,
    })
    expect(bookForJob([], written(2))).toEqual({ ...none, version: null, newerSeen: 2, missing: 2 })
  })

  it('[CB38] is never one that was withdrawn whole', () => {
    const gone = new Set([2])
    expect(bookForJob([1, 2, 3], written(2), gone)).toEqual({ ...none, version: 3 })
    expect(bookForJob([1, 2], written(2), gone)).toEqual({ ...none, version: 1 })
    expect(bookForJob([1, 2], written(1), gone)).toEqual({ ...none, version: 1 })
    expect(bookForJob([2], [], gone)).toEqual({ ...none, version: null })
  })
})
