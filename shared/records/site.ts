import * as z from 'zod'
import { lineSchema, zoneSchema } from './base'

/** A place of work. */
export const siteSchema = z.object({
  name: lineSchema,
  employer: lineSchema.default(''),
  address: lineSchema.default(''),
  zone: zoneSchema,
  archived: z.boolean().default(false),
})
export type Site = z.infer<typeof siteSchema>
