import * as z from 'zod'
import { idSchema, lineSchema, sourceStatusSchema, textSchema } from './base'

export const LIMIT_KINDS = ['twa', 'stel', 'ceiling', 'peak', 'action level'] as const

/** An exposure limit as published; `unit` is the one that governs, the other is for reading only. */
export const limitSchema = z.object({
  agentId: idSchema,
  authority: lineSchema,
  kind: z.enum(LIMIT_KINDS),
  averagingMinutes: z.number().positive().nullable().default(null),
  fraction: lineSchema.default(''),
  expressedAs: lineSchema.default(''),
  value: z.number().positive(),
  unit: lineSchema,
  otherValue: z.number().positive().nullable().default(null),
  otherUnit: lineSchema.default(''),
  skin: z.boolean().default(false),
  carcinogen: z.boolean().default(false),
  citation: lineSchema.default(''),
  status: sourceStatusSchema,
  note: textSchema.default(''),
  archived: z.boolean().default(false),
})
export type Limit = z.infer<typeof limitSchema>
