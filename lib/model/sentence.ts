import * as z from 'zod/mini'

/** What the records of the code book and of the spec sheets share: a sentence, and where a figure comes from. */
export const sentence = z.string().check(z.minLength(3), z.maxLength(400))
export const source = z.string().check(z.minLength(3))
