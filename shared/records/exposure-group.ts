import * as z from 'zod'
import { idSchema, lineSchema, textSchema } from './base'

/** Similar exposure group: workers whose exposure is judged together. */
export const exposureGroupSchema = z.object({
  name: lineSchema,
  siteId: idSchema.nullable().default(null),
  description: textSchema.default(''),
  archived: z.boolean().default(false),
})
export type ExposureGroup = z.infer<typeof exposureGroupSchema>
