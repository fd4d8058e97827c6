import * as z from 'zod'
import { lineSchema } from './base'

/** A substance or agent that is measured. */
export const agentSchema = z.object({
  name: lineSchema,
  cas: lineSchema.default(''),
  molarMassGramsPerMole: z.number().positive().nullable().default(null),
  archived: z.boolean().default(false),
})
export type Agent = z.infer<typeof agentSchema>
