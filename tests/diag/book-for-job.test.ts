import { describe, expect, it } from 'vitest'
import { bookForJob } from '@/lib/diag/book-for-job'

const written = (...versions: (number | null)[]) => versions.map((bookVersion) => ({ bookVersion }))

describe('[R23] the code book a job is worked out with', () => {
  it('[R23] is the newest at hand, whatever its entries were written with', () => {
    expect(bookForJob([1, 2], written(1, 1))).toEqual({ version: 2, newerSeen: null })
    expect(bookForJob([2, 1], written(2, null))).toEqual({ version: 2, newerSeen: null })
    expect(bookForJob([2], [])).toEqual({ version: 2, newerSeen: null })
  })

  it('[R23] says when an entry was written with a version that is not at hand', () => {
    expect(bookForJob([1], written(1, 2))).toEqual({ version: 1, newerSeen: 2 })
    expect(bookForJob([], written(2))).toEqual({ version: null, newerSeen: 2 })
    expect(bookForJob([], written(null))).toEqual({ version: null, newerSeen: null })
  })
})
