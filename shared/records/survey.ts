import * as z from 'zod'
import { daySchema, idSchema, lineSchema, textSchema, zoneSchema } from './base'

/** One piece of work at one site; its crew is a set beside it (`crew`, elements are people). */
export const surveySchema = z.object({
  title: lineSchema,
  siteId: idSchema,
  purpose: textSchema.default(''),
  startsOn: daySchema,
  endsOn: daySchema,
  zone: zoneSchema,
  archived: z.boolean().default(false),
})
export type Survey = z.infer<typeof surveySchema>
