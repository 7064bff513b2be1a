import * as z from 'zod/mini'
import { id } from '@/lib/model/id'

/** Look at a value of a job that did not stand: use it, or leave things as they are. */
export const settleForm = z.strictObject({ jobId: id, historyId: id, use: z.boolean() })
export type SettleForm = z.infer<typeof settleForm>
