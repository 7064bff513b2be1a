import * as z from 'zod/mini'
import { id } from '@/lib/model/id'

/** Put a job into a person's hands, or take it out of them. */
export const assignForm = z.strictObject({ jobId: id, personId: id, assigned: z.boolean() })
export type AssignForm = z.infer<typeof assignForm>
