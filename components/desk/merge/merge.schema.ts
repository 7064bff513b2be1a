import * as z from 'zod/mini'
import { id } from '@/lib/model/id'

/** Merge a job into another that goes on. */
export const mergeForm = z.strictObject({ jobId: id, intoId: id })
export type MergeForm = z.infer<typeof mergeForm>

/** Let a merged job stand for itself again. */
export const unmergeForm = z.strictObject({ jobId: id })
export type UnmergeForm = z.infer<typeof unmergeForm>
