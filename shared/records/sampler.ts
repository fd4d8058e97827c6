import * as z from 'zod'
import { flowSchema, lineSchema, sourceStatusSchema } from './base'

export const FRACTIONS = ['total', 'inhalable', 'thoracic', 'respirable', 'fibres'] as const

/** A sampler and the flow it is designed for; a size-selective one cuts right only at that flow. */
export const samplerSchema = z.object({
  name: lineSchema,
  fraction: z.enum(FRACTIONS).nullable().default(null),
  designFlowLitresPerMinute: flowSchema.nullable().default(null),
  source: lineSchema.default(''),
  status: sourceStatusSchema,
  archived: z.boolean().default(false),
})
export type Sampler = z.infer<typeof samplerSchema>
