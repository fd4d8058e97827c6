import * as z from 'zod'
import { idSchema, lineSchema } from './base'

/** A worker, known by a code; name and contact travel apart, in the operation's `personal` part. */
export const workerSchema = z.object({
  code: lineSchema,
  jobTitle: lineSchema.default(''),
  siteId: idSchema.nullable().default(null),
  groupId: idSchema.nullable().default(null),
  archived: z.boolean().default(false),
})
export type Worker = z.infer<typeof workerSchema>
